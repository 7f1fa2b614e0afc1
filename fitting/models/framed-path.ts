/**
 * A path whose origin stands beside the reference point of the measures, and may drift against it:
 *   x + x_f + ẋ_f (t − t_ref),   y + y_f + ẏ_f (t − t_ref)       x north, y east, arcsec; t Julian years.
 * The path gives the place of the body against the focus, the frame that of the focus against the reference point.
 */
import type { SkyPath } from './sky-path'

export const FRAME_OFFSETS = ['none', 'offset', 'offset-and-drift'] as const
export type FrameOffset = (typeof FRAME_OFFSETS)[number]

const PARAMETERS: Record<FrameOffset, 0 | 2 | 4> = { none: 0, offset: 2, 'offset-and-drift': 4 }

/**
 * Parameters that the frame adds.
 * @param frame setting.
 * @returns 0, 2 (x_f, y_f) or 4 (x_f, y_f, ẋ_f, ẏ_f).
 */
export function frameParameters(frame: FrameOffset): 0 | 2 | 4 {
  return PARAMETERS[frame]
}

/**
 * The path with the frame's parameters behind its own.
 * @param path about the focus.
 * @param frame what the reference point may do.
 * @param referenceEpochYr t_ref, Julian year.
 * @returns the path itself where the frame is 'none'.
 */
export function framedPath(path: SkyPath, frame: FrameOffset, referenceEpochYr: number): SkyPath {
  const own = path.parameters
  const added = frameParameters(frame)
  if (added === 0) return path
  const p = own + added
  const inner = new Float64Array(2 + 2 * own)
  let shift = new Float64Array(added)
  return {
    parameters: p,
    prepare(values) {
      shift = Float64Array.from({ length: added }, (_, j) => values[own + j]!)
      return path.prepare(values)
    },
    at(epochYr, out, withPartials) {
      path.at(epochYr, inner, withPartials)
      const elapsed = added === 4 ? epochYr - referenceEpochYr : 0
      out[0] = inner[0]! + shift[0]! + (added === 4 ? shift[2]! * elapsed : 0)
      out[1] = inner[1]! + shift[1]! + (added === 4 ? shift[3]! * elapsed : 0)
      if (!withPartials) return
      out.fill(0, 2, 2 + 2 * p)
      for (let j = 0; j < own; j++) {
        out[2 + j] = inner[2 + j]!
        out[2 + p + j] = inner[2 + own + j]!
      }
      out[2 + own] = out[2 + p + own + 1] = 1
      if (added === 4) out[2 + own + 2] = out[2 + p + own + 3] = elapsed
    },
  }
}
