import { nameKey } from '#shared/intake/name-key'
import type { EditionSummary, orbitsQuerySchema } from '#shared/schemas/editions'
import type { Page } from '#shared/schemas/ids'
import type { ValueOf } from '#shared/schemas/parse'
import type { Context } from '../../context/context'
import { DEFAULT_LIMIT, decodeCursor, pageOf } from '../../repositories/cursor'
import { listCurrentEditions } from '../../repositories/edition-repository'
import { editionSummaryViews } from './edition-summary-view'

/** The editions in force, the newest first, by name and kind. Open to everybody. */
export async function listEditions(ctx: Context, { q, kind, cursor, limit = DEFAULT_LIMIT }: ValueOf<typeof orbitsQuerySchema>): Promise<Page<EditionSummary>> {
  const [publishedAt, id] = cursor === undefined ? [] : decodeCursor(cursor, ['string', 'string'])
  const rows = await listCurrentEditions(ctx.reads, {
    ...(kind ? { kind } : {}),
    ...(q ? { nameKeyPart: nameKey(q) } : {}),
    ...(publishedAt !== undefined && id !== undefined ? { after: { publishedAt, id } } : {}),
    limit: limit + 1,
  })
  const page = pageOf(rows, limit, { keyOf: row => [row.published_at, row.id], itemOf: row => row })
  return { items: await editionSummaryViews(ctx.reads, page.items), nextCursor: page.nextCursor }
}
