import { mayAdminister } from '#shared/policies/administering'
import type { createProgrammeSchema, ProgrammeView } from '#shared/schemas/targets'
import type { ValueOf } from '#shared/schemas/parse'
import { recordAudit } from '../../audit/record-audit'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { AppError, notFound } from '../../errors/app-error'
import { findProgrammeByName, getProgramme, insertProgramme } from '../../repositories/programme-repository'
import { programmeView } from './list-programmes'

/** Makes a programme without coordinators; they are named by changeRoles. For administrators; records programme.created; throws name-taken. */
export async function createProgramme(ctx: Context, programme: ValueOf<typeof createProgrammeSchema>): Promise<ProgrammeView> {
  if (!mayAdminister(ctx.actor)) throw notFound()
  return await withTransaction(ctx, async (tx) => {
    if (await findProgrammeByName(tx, programme.name)) {
      throw new AppError('name-taken', `There is already a programme named "${programme.name}". Choose another name.`, { fields: [{ path: 'name', reason: 'is already taken' }] })
    }
    const id = ctx.ids.newId()
    await insertProgramme(tx, {
      id,
      name: programme.name,
      description: programme.description,
      least_measures: programme.leastMeasures,
      least_observers: programme.leastObservers,
      least_arc_turns: programme.leastArcTurns,
      created_at: ctx.clock.now(),
    })
    await recordAudit(tx, ctx, { event: 'programme.created', subjectKind: 'programme', subjectId: id, detail: { name: programme.name } })
    return await programmeView(tx, await getProgramme(tx, id))
  })
}
