import type { Insertable, Selectable } from 'kysely'
import { notFound } from '../errors/app-error'
import type { ProgrammeTable } from '../db/schema'
import type { Reads, Tx } from './connection'

export type ProgrammeRow = Selectable<ProgrammeTable>

export async function insertProgramme(tx: Tx, row: Insertable<ProgrammeTable>): Promise<void> {
  await tx.insertInto('programme').values(row).execute()
}

export async function findProgramme(reads: Reads, id: string): Promise<ProgrammeRow | undefined> {
  return await reads.selectFrom('programme').selectAll().where('id', '=', id).executeTakeFirst()
}

export async function getProgramme(reads: Reads, id: string): Promise<ProgrammeRow> {
  const programme = await findProgramme(reads, id)
  if (!programme) throw notFound()
  return programme
}

export async function findProgrammeByName(reads: Reads, name: string): Promise<ProgrammeRow | undefined> {
  return await reads.selectFrom('programme').selectAll().where('name', '=', name).executeTakeFirst()
}

/** By name, from after `after` (name, id) where given. */
export async function listProgrammes(reads: Reads, { after, limit }: { after?: [string, string], limit: number }): Promise<ProgrammeRow[]> {
  return await reads.selectFrom('programme').selectAll()
    .$if(after !== undefined, query => query.where(({ eb, refTuple, tuple }) => eb(refTuple('name', 'id'), '>', tuple(after![0], after![1]))))
    .orderBy('name').orderBy('id').limit(limit).execute()
}

/** Which of these ids are no programme. */
export async function findUnknownProgrammes(reads: Reads, ids: readonly string[]): Promise<string[]> {
  if (ids.length === 0) return []
  const known = await reads.selectFrom('programme').select('id').where('id', 'in', ids).execute()
  return ids.filter(id => !known.some(programme => programme.id === id))
}
