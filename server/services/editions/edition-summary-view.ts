import type { EditionSnapshot, EditionSummary } from '#shared/schemas/editions'
import { thumbnailSvg } from '#shared/drawing/thumbnail-svg'
import type { Reads } from '../../context/context'
import { getSnapshotText } from '../../repositories/edition-repository'
import type { EditionRecord } from '../../repositories/edition-repository'

/** What a list says of an edition and only its snapshot holds. */
type Digest = Pick<EditionSummary, 'measures' | 'observers' | 'thumbnailSvg'>

/** An edition never changes, so what its snapshot says is worked out once a process; the hash of its bytes is the key. */
const digests = new Map<string, Digest>()
const MOST_REMEMBERED = 2000

export function digestOf(snapshot: EditionSnapshot): Digest {
  return {
    measures: snapshot.measures.filter(measure => measure.role === 'used').length,
    observers: snapshot.observers.length,
    thumbnailSvg: thumbnailSvg(snapshot.result),
  }
}

/** An edition as lists and feeds show it. */
export async function editionSummaryView(reads: Reads, edition: EditionRecord): Promise<EditionSummary> {
  return summaryOf(edition, digests.get(edition.sha256) ?? remember(edition.sha256, await readDigest(reads, edition.id)))
}

export async function editionSummaryViews(reads: Reads, editions: readonly EditionRecord[]): Promise<EditionSummary[]> {
  const views: EditionSummary[] = []
  for (const edition of editions) views.push(await editionSummaryView(reads, edition))
  return views
}

export function summaryOf(edition: EditionRecord, digest: Digest): EditionSummary {
  return {
    targetId: edition.target_id,
    targetName: edition.target_name,
    kind: edition.kind,
    programmeName: edition.programme_name,
    number: edition.number,
    state: edition.state,
    publishedAt: edition.published_at,
    sha256: edition.sha256,
    summary: edition.summary,
    ...digest,
  }
}

async function readDigest(reads: Reads, editionId: string): Promise<Digest> {
  return digestOf(JSON.parse(await getSnapshotText(reads, editionId)) as EditionSnapshot)
}

function remember(sha256: string, digest: Digest): Digest {
  const oldest = digests.keys().next()
  if (digests.size >= MOST_REMEMBERED && !oldest.done) digests.delete(oldest.value)
  digests.set(sha256, digest)
  return digest
}
