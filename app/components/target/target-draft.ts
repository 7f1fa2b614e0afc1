import type { InputOf } from '#shared/schemas/parse'
import type { createTargetSchema } from '#shared/schemas/targets'
import type { Kind } from '~~/fitting/types'

/** What the form for a new target holds: text as typed. */
export interface TargetDraft {
  kind: Kind
  programmeId: string
  name: string
  aliases: string
  componentA: string
  componentB: string
  radiusUnit: string
  diameterScaleArcmin: string
  isSun: boolean
  remarks: string
}

export function blankTarget(programmeId: string): TargetDraft {
  return { kind: 'relative', programmeId, name: '', aliases: '', componentA: '', componentB: '', radiusUnit: '', diameterScaleArcmin: '', isSun: false, remarks: '' }
}

/** The body for POST /targets; fields of other kinds are left out, empty ones go as null. */
export function targetBody(draft: TargetDraft): InputOf<typeof createTargetSchema> {
  const common = {
    programmeId: draft.programmeId,
    kind: draft.kind,
    name: draft.name,
    aliases: draft.aliases.split(',').map(alias => alias.trim()).filter(Boolean),
    remarks: draft.remarks,
  }
  if (draft.kind === 'relative') return { ...common, componentA: draft.componentA || null, componentB: draft.componentB || null }
  if (draft.kind === 'equatorial') return common
  return {
    ...common,
    radiusUnit: draft.radiusUnit || null,
    // An unreadable number goes as NaN, which JSON turns to null; so it is refused here as text would be there.
    diameterScaleArcmin: draft.diameterScaleArcmin === '' ? null : readDecimal(draft.diameterScaleArcmin),
    caution: draft.isSun ? 'sun' : 'none',
  }
}

/** A decimal number as typed, with a dot or a comma; what cannot be read becomes −1, which the schema refuses with its reason. */
function readDecimal(text: string): number {
  const value = Number(text.trim().replace(',', '.'))
  return Number.isFinite(value) ? value : -1
}
