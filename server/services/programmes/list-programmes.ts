import type { Page } from '#shared/schemas/ids'
import type { ProgrammeView } from '#shared/schemas/targets'
import type { Context, Reads } from '../../context/context'
import { decodeCursor, DEFAULT_LIMIT, pageOf } from '../../repositories/cursor'
import type { PageQuery } from '../../repositories/cursor'
import { listCoordinators } from '../../repositories/person-repository'
import { listProgrammes as listProgrammeRows } from '../../repositories/programme-repository'
import type { ProgrammeRow } from '../../repositories/programme-repository'

/** All programmes by name, with their coordinators and rules. Open to everybody. */
export async function listProgrammes(ctx: Context, { cursor, limit = DEFAULT_LIMIT }: PageQuery): Promise<Page<ProgrammeView>> {
  const after = cursor === undefined ? undefined : decodeCursor(cursor, ['string', 'string'])
  const rows = await listProgrammeRows(ctx.reads, { after, limit: limit + 1 })
  const { items, nextCursor } = pageOf(rows, limit, { keyOf: row => [row.name, row.id], itemOf: row => row })
  return { items: await Promise.all(items.map(row => programmeView(ctx.reads, row))), nextCursor }
}

export async function programmeView(reads: Reads, row: ProgrammeRow): Promise<ProgrammeView> {
  const coordinators = await listCoordinators(reads, row.id)
  return {
    id: row.id,
    name: row.name,
    description: row.description,
    leastMeasures: row.least_measures,
    leastObservers: row.least_observers,
    leastArcTurns: row.least_arc_turns,
    coordinators: coordinators.map(person => ({ id: person.id, displayName: person.display_name })),
  }
}
