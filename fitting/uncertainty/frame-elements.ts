/** Offset and drift of the reference point of the measures, as elements and in words. */
import { frameParameters, type FrameOffset } from '../models/framed-path'
import type { Element } from '../types'
import { elementOf, type ErrorScale } from './error-scale'

/** Names of the frame's elements, in the order of its parameters. */
const FRAME_ELEMENT_NAMES = ['frameOffsetNorth', 'frameOffsetEast', 'frameDriftNorth', 'frameDriftEast'] as const

export interface FittedFrame {
  frame: FrameOffset
  /** Index of the frame's first parameter. */
  frameFrom: number
  fitted: ArrayLike<number>
  covariance: number[][] | null
  scale: ErrorScale
}

/**
 * The frame's elements.
 * @param fitted parameters of a solution with their covariance of unit variance.
 * @returns none, two (arcsec) or four (arcsec, and arcsec a year) elements by name: the place of the focus against the reference point.
 */
export function frameElements({ frame, frameFrom, fitted, covariance, scale }: FittedFrame): Record<string, Element> {
  const out: Record<string, Element> = {}
  for (let k = 0; k < frameParameters(frame); k++) {
    const gradient = new Float64Array(fitted.length)
    gradient[frameFrom + k] = 1
    out[FRAME_ELEMENT_NAMES[k]!] = elementOf({ value: fitted[frameFrom + k]!, gradient, unit: k < 2 ? 'arcsec' : 'arcsec/yr' }, covariance, scale)
  }
  return out
}

/**
 * Where the focus stands against the reference point.
 * @param fitted parameters of a solution.
 * @param referenceEpochYr Julian year.
 * @returns north and east, arcsec, at an epoch, Julian year.
 */
export function frameShift({ frame, frameFrom, fitted }: Pick<FittedFrame, 'frame' | 'frameFrom' | 'fitted'>, referenceEpochYr: number): (epochYr: number) => { north: number; east: number } {
  const at = (k: number) => (k < frameParameters(frame) ? fitted[frameFrom + k]! : 0)
  return (epochYr) => ({ north: at(0) + at(2) * (epochYr - referenceEpochYr), east: at(1) + at(3) * (epochYr - referenceEpochYr) })
}

/**
 * What to say about the frame.
 * @param frame setting.
 * @param referenceEpochYr Julian year.
 * @returns a sentence, or none.
 */
export function aboutFrame(frame: FrameOffset, referenceEpochYr: number): string[] {
  if (frame === 'none') return []
  const what = frame === 'offset' ? 'An offset' : `An offset at ${referenceEpochYr.toFixed(2)} and a steady drift`
  return [`${what} of the reference point of the measures was fitted beside the orbit. Predictions are places against the focus, without it; computed places of the measures hold it.`]
}
