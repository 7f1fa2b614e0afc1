/**
 * The form in which a relative orbit is fitted: all seven regular parameters, or those that held elements leave free; about the reference
 * point of the measures, or with that point's offset and drift behind the orbit's own parameters.
 */
import { constrainedPath, expandedCovariance } from './constrained-path'
import { framedPath, type FrameOffset } from './framed-path'
import { heldOrbit, type Held } from './held-orbit'
import { keplerPath, RELATIVE_KEPLER_NAMES } from './relative-kepler'
import type { SkyPath } from './sky-path'

const REGULAR = RELATIVE_KEPLER_NAMES.length

export interface RelativeForm {
  /** In the fitted parameters. */
  path: SkyPath
  held: Held
  frame: FrameOffset
  /** Index of the frame's first parameter. */
  frameFrom: number
  /** True where the fitted parameters begin with the seven regular ones. */
  isRegular: boolean
  /** Regular parameters of the orbit. */
  regular(fitted: ArrayLike<number>): ArrayLike<number>
  /** Their covariance, 7 × 7. */
  regularCovariance(fitted: ArrayLike<number>, covariance: number[][] | null): number[][] | null
  /** Fitted parameters to start from, near a regular orbit. */
  starts(regular: ArrayLike<number>): ArrayLike<number>[]
}

function topLeft(covariance: number[][] | null): number[][] | null {
  return covariance?.slice(0, REGULAR).map((row) => row.slice(0, REGULAR)) ?? null
}

function regularForm(frame: FrameOffset, referenceEpochYr: number): RelativeForm {
  const path = framedPath(keplerPath(referenceEpochYr), frame, referenceEpochYr)
  const isPlain = frame === 'none'
  return {
    path, held: {}, frame, frameFrom: REGULAR, isRegular: true,
    regular: (fitted) => (isPlain ? fitted : Array.from(fitted).slice(0, REGULAR)),
    regularCovariance: (_fitted, covariance) => (isPlain ? covariance : topLeft(covariance)),
    starts: (regular) => [isPlain ? regular : Float64Array.from({ length: path.parameters }, (_, j) => (j < REGULAR ? regular[j]! : 0))],
  }
}

/**
 * The form for held elements and a frame.
 * @param held elements by name, in published units; none for the plain orbit.
 * @param frame what the reference point of the measures may do.
 * @param referenceEpochYr t_ref, Julian year.
 * @returns path, and the ways to and from regular parameters.
 */
export function relativeForm(held: Held, frame: FrameOffset, referenceEpochYr: number): RelativeForm {
  if (Object.keys(held).length === 0) return regularForm(frame, referenceEpochYr)
  const orbit = heldOrbit(held, referenceEpochYr)
  const path = framedPath(constrainedPath(keplerPath(referenceEpochYr), orbit), frame, referenceEpochYr)
  return {
    path, held, frame, frameFrom: orbit.free, isRegular: false,
    regular(fitted) {
      const values = new Float64Array(REGULAR)
      orbit.expand(fitted, values, null)
      return values
    },
    regularCovariance: (fitted, covariance) => (covariance === null ? null : expandedCovariance(orbit, fitted, covariance)),
    starts: (regular) => orbit.starts(regular).map((start) => Float64Array.from({ length: path.parameters }, (_, j) => start[j] ?? 0)),
  }
}
