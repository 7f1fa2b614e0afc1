import type { FitResult } from '../../fitting/types'
import { formatNumber } from '../../shared/units/number-text'

export interface PublishingRules {
  leastMeasures: number
  leastObservers: number
  leastArcTurns: number
  needsSecondConsent: boolean
}

export interface PublishingCase {
  measuresUsed: number
  observersUsed: number
  /** Straight motion and rest have no turn that could be covered. */
  isOrbit: boolean
  /** How much of a turn the measures cover; null where nothing says. */
  arcTurns: number | null
  /** Why no edition can stand on this result whatever the programme asks for, in sentences. */
  hindrances: string[]
  /** Coordinators other than the one who accepted, who gave their consent. */
  consents: number
}

/** The case a result makes: set-asides do not count, and an arc without times is the share of the directions covered. */
export function publishingCase(result: FitResult, consents: number): PublishingCase {
  const { used, arc, byObserver } = result.statistics
  const coveredDeg = result.kind === 'plane' ? arc.trueAnomalyCoveredDeg : null
  return {
    measuresUsed: used,
    observersUsed: byObserver.filter(o => o.measures > 0).length,
    isOrbit: result.model === 'kepler',
    arcTurns: arc.turns ?? (coveredDeg === null ? null : coveredDeg / 360),
    hindrances: hindrancesOf(result),
    consents,
  }
}

/** An orbit about the Sun is published over the arc for which its motion is honest, and only where measures test it. */
function hindrancesOf({ kind, honestArc, statistics, alternatives }: FitResult): string[] {
  if (kind !== 'equatorial') return []
  const hindrances: string[] = []
  if (honestArc && (honestArc.standing === 'strained' || honestArc.standing === 'needs-perturbations')) {
    hindrances.push(`${honestArc.statement} No edition goes past the arc for which its motion is honest: ask for a fit with the planets, or set measures aside until the arc is short enough.`)
  }
  if (statistics.degreesOfFreedom < 1) {
    const others = alternatives.length > 0 ? `, and ${alternatives.length === 1 ? 'another orbit passes' : `${alternatives.length} other orbits pass`} through them as well` : ''
    hindrances.push(`Nothing tests this orbit: it passes through every measure by construction${others}. At least one measure more is needed.`)
  }
  return hindrances
}

/** The rules of the programme that are not met, each in a sentence; empty where publishing is open. */
export function unmetRules(rules: PublishingRules, found: PublishingCase): string[] {
  const unmet = [...found.hindrances]
  if (found.measuresUsed < rules.leastMeasures) {
    unmet.push(`The programme asks for at least ${rules.leastMeasures} measures; ${found.measuresUsed} are used here.`)
  }
  if (found.observersUsed < rules.leastObservers) {
    unmet.push(`The programme asks for at least ${rules.leastObservers} observers; the measures used are by ${found.observersUsed}.`)
  }
  if (found.isOrbit && rules.leastArcTurns > 0 && (found.arcTurns === null || found.arcTurns < rules.leastArcTurns)) {
    const covered = found.arcTurns === null ? 'how much these cover is not known' : `these cover ${formatNumber(found.arcTurns, 2)}`
    unmet.push(`The programme asks for measures over at least ${rules.leastArcTurns} of a turn; ${covered}.`)
  }
  if (rules.needsSecondConsent && found.consents < 1) {
    unmet.push('The programme asks for the consent of a second coordinator; nobody has given it yet.')
  }
  return unmet
}
