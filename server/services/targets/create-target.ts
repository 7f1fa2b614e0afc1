import { nameKey } from '#shared/intake/name-key'
import { mayCreateTarget } from '#shared/policies/coordinating'
import type { ValueOf } from '#shared/schemas/parse'
import type { createTargetSchema, TargetView } from '#shared/schemas/targets'
import { withTransaction } from '../../context/context'
import type { Context, Tx } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import { AppError, notFound } from '../../errors/app-error'
import { findProgramme } from '../../repositories/programme-repository'
import { insertTarget, insertTargetName, mapTargetsByNameKey } from '../../repositories/target-repository'
import { viewTarget } from './read-target'

type NewTarget = ValueOf<typeof createTargetSchema>

/**
 * Makes a target with its names. Open to coordinators of the programme; records 'target.created'; throws name-taken where any of
 * the names already means another target.
 */
export async function createTarget(ctx: Context, target: NewTarget): Promise<TargetView> {
  return withTransaction(ctx, async (tx) => {
    if (!mayCreateTarget(ctx.actor, target) || !await findProgramme(tx, target.programmeId)) throw notFound()
    const id = ctx.ids.newId()
    const names = namesByKey([target.name, ...target.aliases])
    await refuseTakenNames(tx, names)
    await insertTarget(tx, {
      id,
      programme_id: target.programmeId,
      kind: target.kind,
      name: target.name,
      system_id: null,
      component_a: target.componentA ?? null,
      component_b: target.componentB ?? null,
      radius_unit: target.radiusUnit ?? null,
      diameter_scale_arcmin: target.diameterScaleArcmin ?? null,
      caution: target.caution,
      remarks: target.remarks,
      created_at: ctx.clock.now(),
    })
    for (const [name_key, name] of names) await insertTargetName(tx, { id: ctx.ids.newId(), target_id: id, name, name_key })
    await recordAudit(tx, ctx, { event: 'target.created', subjectKind: 'target', subjectId: id, targetId: id, detail: { name: target.name, kind: target.kind } })
    return viewTarget(ctx, tx, id, null)
  })
}

function namesByKey(names: readonly string[]): Map<string, string> {
  const byKey = new Map<string, string>()
  for (const name of names) if (!byKey.has(nameKey(name))) byKey.set(nameKey(name), name)
  return byKey
}

async function refuseTakenNames(tx: Tx, names: ReadonlyMap<string, string>): Promise<void> {
  const taken = await mapTargetsByNameKey(tx, [...names.keys()])
  const [key] = taken.keys()
  if (key === undefined) return
  throw new AppError('name-taken', `There is already a target called "${names.get(key)}". Choose another name, or send the measures to that target.`, {
    fields: [{ path: key === [...names.keys()][0] ? 'name' : 'aliases', reason: 'is already taken' }],
  })
}
