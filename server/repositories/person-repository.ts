import type { Insertable, Selectable } from 'kysely'
import { notFound } from '../errors/app-error'
import type { PersonTable } from '../db/schema'
import type { Reads, Tx } from './connection'

export type PersonRow = Selectable<PersonTable>
export type PersonWithRoles = PersonRow & { coordinatorOf: string[] }

export async function insertPerson(tx: Tx, row: Insertable<PersonTable>): Promise<void> {
  await tx.insertInto('person').values(row).execute()
}

export async function updatePerson(tx: Tx, id: string, change: Partial<Omit<PersonRow, 'id' | 'created_at'>>): Promise<void> {
  await tx.updateTable('person').set(change).where('id', '=', id).execute()
}

export async function findPersonByEmail(reads: Reads, email: string): Promise<PersonRow | undefined> {
  return await reads.selectFrom('person').selectAll().where('email', '=', email).executeTakeFirst()
}

export async function findPerson(reads: Reads, id: string): Promise<PersonWithRoles | undefined> {
  const person = await reads.selectFrom('person').selectAll().where('id', '=', id).executeTakeFirst()
  if (!person) return undefined
  const roles = await reads.selectFrom('programme_role').select('programme_id').where('person_id', '=', id).orderBy('programme_id').execute()
  return { ...person, coordinatorOf: roles.map(role => role.programme_id) }
}

export async function getPerson(reads: Reads, id: string): Promise<PersonWithRoles> {
  const person = await findPerson(reads, id)
  if (!person) throw notFound()
  return person
}

export async function hasAnyPerson(reads: Reads): Promise<boolean> {
  return await reads.selectFrom('person').select('id').limit(1).executeTakeFirst() !== undefined
}

/** By name, from after `after` (name, id) where given. */
export async function listPeople(reads: Reads, { after, limit }: { after?: [string, string], limit: number }): Promise<PersonWithRoles[]> {
  const people = await reads.selectFrom('person').selectAll()
    .$if(after !== undefined, query => query.where(({ eb, refTuple, tuple }) => eb(refTuple('display_name', 'id'), '>', tuple(after![0], after![1]))))
    .orderBy('display_name').orderBy('id').limit(limit).execute()
  if (people.length === 0) return []
  const roles = await reads.selectFrom('programme_role').select(['person_id', 'programme_id'])
    .where('person_id', 'in', people.map(person => person.id)).orderBy('programme_id').execute()
  return people.map(person => ({ ...person, coordinatorOf: roles.filter(role => role.person_id === person.id).map(role => role.programme_id) }))
}

/** Active administrators, other than one person where given. */
export async function countAdministrators(reads: Reads, { except }: { except?: string } = {}): Promise<number> {
  const row = await reads.selectFrom('person').select(({ fn }) => fn.countAll<number>().as('count'))
    .where('is_administrator', '=', 1).where('state', '=', 'active')
    .$if(except !== undefined, query => query.where('id', '!=', except!))
    .executeTakeFirstOrThrow()
  return row.count
}

/** Makes these the programmes that the person coordinates, and no others. */
export async function setCoordinatorOf(tx: Tx, personId: string, programmeIds: readonly string[], now: string): Promise<void> {
  await tx.deleteFrom('programme_role').where('person_id', '=', personId).where('programme_id', 'not in', [...programmeIds, '']).execute()
  for (const programmeId of programmeIds) {
    await tx.insertInto('programme_role')
      .values({ programme_id: programmeId, person_id: personId, role: 'coordinator', created_at: now })
      .onConflict(conflict => conflict.doNothing())
      .execute()
  }
}

/** Active people who coordinate the programme, by name. */
export async function listCoordinators(reads: Reads, programmeId: string): Promise<{ id: string, display_name: string }[]> {
  return await reads.selectFrom('programme_role').innerJoin('person', 'person.id', 'programme_role.person_id')
    .select(['person.id', 'person.display_name'])
    .where('programme_role.programme_id', '=', programmeId).where('person.state', '=', 'active')
    .orderBy('person.display_name').orderBy('person.id')
    .execute()
}
