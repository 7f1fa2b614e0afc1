import type { EditionSnapshot } from '#shared/schemas/editions'
import type { Context } from '../../context/context'
import { sha256Hex } from '../../domain/canonical-json'
import { elementsCsv, ephemerisCsv, measuresCsv, setAsideCsv } from '../../domain/edition-tables'
import { getEdition, getSnapshotText } from '../../repositories/edition-repository'

/** The tables of an edition, by the name of their file. */
const TABLES = { 'measures.csv': measuresCsv, 'set-aside.csv': setAsideCsv, 'ephemeris.csv': ephemerisCsv, 'elements.csv': elementsCsv } as const

export type DownloadName = 'snapshot.json' | keyof typeof TABLES

export interface Download {
  text: string
  mediaType: string
  fileName: string
  /** SHA-256 of the text's bytes; for the snapshot the one that the edition is known by. */
  sha256: string
  /** The permanent page by which the edition is cited. */
  citeAs: string
}

/** A file of an edition: the snapshot byte for byte as it was sealed, or a table made from it. Open to everybody; throws not-found. */
export async function downloadEdition(ctx: Context, { targetId, number, name }: { targetId: string, number: number, name: DownloadName }): Promise<Download> {
  const edition = await getEdition(ctx.reads, targetId, number)
  const bytes = await getSnapshotText(ctx.reads, edition.id)
  const rest = { fileName: `${fileStem(edition.target_name)}-edition-${number}-${name}`, citeAs: `${ctx.baseUrl}/orbits/${targetId}/${number}` }
  if (name === 'snapshot.json') return { ...rest, text: bytes, mediaType: 'application/json', sha256: edition.sha256 }
  const text = TABLES[name](JSON.parse(bytes) as EditionSnapshot)
  return { ...rest, text, mediaType: 'text/csv; charset=utf-8; header=present', sha256: sha256Hex(text) }
}

/** Letters and digits that every file system takes. */
function fileStem(name: string): string {
  return name.normalize('NFKD').toLowerCase().replace(/[^a-z0-9]+/g, '-').replace(/^-|-$/g, '').slice(0, 60) || 'orbit'
}
