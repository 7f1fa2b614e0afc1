import type { FitResult, Refusal } from '../../fitting/types'
import { ELEMENT_LABELS, elementFamily } from '../../shared/units/element-labels'
import { joinWords } from '../../shared/units/list-text'
import { formatNumber } from '../../shared/units/number-text'
import { counted } from './wording'

const SPOKEN_CHANGE_SIGMA = 2

export interface DeskFit {
  result: FitResult | null
  refusal: Refusal | null
  changeInSigma: Record<string, number | null> | null
}

function changeNote(result: FitResult, change: Record<string, number | null>): string | null {
  const labels = ELEMENT_LABELS[elementFamily(result)]
  const spoken = (name: string) => labels.find(label => label.name === name)?.word ?? name
  const moved = Object.entries(change)
    .filter((entry): entry is [string, number] => entry[1] !== null && Math.abs(entry[1]) >= SPOKEN_CHANGE_SIGMA)
    .sort((a, b) => Math.abs(b[1]) - Math.abs(a[1]))
    .slice(0, 2)
    .map(([name, sigma]) => `${spoken(name)} by ${formatNumber(Math.abs(sigma), 1)} σ`)
  return moved.length ? `Against the edition in force ${joinWords(moved)} moved` : null
}

function proposalNotes(result: FitResult): string[] {
  const quadrants = result.proposals.filter(p => p.action === 'change-quadrant').length
  const outliers = result.proposals.filter(p => p.action === 'set-aside').length
  return [
    ...(outliers ? [`${counted(outliers, 'measure')} proposed to be set aside`] : []),
    ...(quadrants ? [`${counted(quadrants, 'quadrant')} may be exchanged`] : []),
  ]
}

/** What a coordinator should know before opening the fit, in words; empty where nothing stands out. */
export function deskNotes({ result, refusal, changeInSigma }: DeskFit): string[] {
  if (refusal) return [`${refusal.sentence} ${refusal.remedy}`]
  if (!result) return []
  const change = changeInSigma ? changeNote(result, changeInSigma) : null
  const others = result.alternatives.length
  return [
    ...proposalNotes(result),
    ...(change ? [change] : []),
    ...(others ? [others === 1 ? 'Another orbit fits nearly as well' : `${others} other orbits fit nearly as well`] : []),
    ...result.warnings,
  ]
}

/** "9 measures by T. Orrowin", "12 measures by 3 observers", "Refit without new measures". */
export function deskSubject(newMeasures: number, observers: readonly string[]): string {
  if (newMeasures === 0) return 'Refit without new measures'
  const who = observers.length > 2 ? counted(observers.length, 'observer') : joinWords(observers)
  return `${counted(newMeasures, 'new measure')} by ${who}`
}
