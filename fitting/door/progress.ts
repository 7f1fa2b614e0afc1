/** Progress of a fit: stages in order, the fraction over the whole never falling. */
import type { Progress } from '../types'

/** Reports the part done, 0 … 1, of a stage. */
export type Report = (stage: Progress['stage'], part: number) => void

/** Where each stage begins and ends in the whole. */
const SHARES: Record<Progress['stage'], readonly [number, number]> = {
  reading: [0, 0.05], searching: [0.05, 0.75], polishing: [0.75, 0.95], judging: [0.95, 1],
}

/**
 * Makes a reporter that never goes back.
 * @param onProgress the caller's listener, if any.
 * @returns a reporter for the stages.
 */
export function progressReport(onProgress?: (progress: Progress) => void): Report {
  let reached = 0
  let at = 0
  const order = Object.keys(SHARES)
  return (stage, part) => {
    if (!onProgress || order.indexOf(stage) < at) return
    at = order.indexOf(stage)
    const [from, to] = SHARES[stage]
    reached = Math.max(reached, from + (to - from) * Math.min(1, Math.max(0, part)))
    onProgress({ stage, fraction: reached })
  }
}
