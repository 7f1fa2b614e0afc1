import { notFound } from '../errors/app-error'
import type { Reads, Tx } from './connection'

/** Keeps the bytes once for each hash: the same file again adds nothing. */
export async function insertRawFile(tx: Tx, file: { sha256: string; bytes: Buffer; created_at: string }): Promise<void> {
  await tx
    .insertInto('raw_file')
    .values({ ...file, byte_count: file.bytes.byteLength })
    .onConflict(c => c.column('sha256').doNothing())
    .execute()
}

export async function getRawFile(reads: Reads, sha256: string): Promise<{ bytes: Buffer; byte_count: number }> {
  const row = await reads.selectFrom('raw_file').select(['bytes', 'byte_count']).where('sha256', '=', sha256).executeTakeFirst()
  if (!row) throw notFound()
  return row
}

export async function getByteCount(reads: Reads, sha256: string): Promise<number> {
  const row = await reads.selectFrom('raw_file').select('byte_count').where('sha256', '=', sha256).executeTakeFirst()
  if (!row) throw notFound()
  return row.byte_count
}
