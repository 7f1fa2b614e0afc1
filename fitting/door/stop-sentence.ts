/** Why the solver stopped, for people. */
import type { StopReason } from '../types'

const SENTENCES: Record<StopReason, string> = {
  'chi-square-settled': 'Stopped because χ² no longer falls.',
  'step-settled': 'Stopped because the steps became smaller than rounding.',
  'gradient-settled': 'Stopped because no change of any parameter lowers χ².',
  'iteration-limit': 'Stopped at the limit of iterations before χ² had settled: the elements are not final.',
  'singular': 'Stopped because the measures do not determine every element.',
  'exact': 'Solved exactly: there are as many measured coordinates as unknowns.',
  'linear': 'Solved in one step: the problem is linear.',
}

/**
 * The sentence of a stop reason.
 * @param reason of the closed list.
 * @returns one sentence.
 */
export function stopSentence(reason: StopReason): string {
  return SENTENCES[reason]
}
