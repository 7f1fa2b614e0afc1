/** The least-squares problem of a path on the sky and the rows of its measures. */
import type { LeastSquaresProblem } from '../solve/least-squares-problem'
import type { SkyMeasure } from './sky-measure'
import type { SkyPath } from './sky-path'
import { evaluateRow, rowBuffer, skyRow, type SkyRow } from './sky-rows'

/**
 * Rows of the used measures.
 * @param measures used measures with errors, sorted.
 * @param computedRhoArcsec ρ of an earlier pass, one a measure, that turns σ_θ into a transverse error; observed ρ without it.
 * @returns one prepared row or row pair a measure, in the same order.
 */
export function skyRows(measures: readonly SkyMeasure[], computedRhoArcsec?: ArrayLike<number>): SkyRow[] {
  return measures.map((measure, i) => skyRow(measure, computedRhoArcsec?.[i] ?? measure.rhoArcsec))
}

/** Copies one row and its derivatives by the parameters. */
function chain(jacobian: Float64Array, start: number, p: number, byX: number, byY: number, position: Float64Array): void {
  for (let j = 0; j < p; j++) jacobian[start + j] = byX * position[2 + j]! + byY * position[2 + p + j]!
}

/**
 * Whitened least-squares problem of a path.
 * @param path any path on the sky.
 * @param rows prepared rows.
 * @returns a problem with analytic Jacobian.
 */
export function skyProblem(path: SkyPath, rows: readonly SkyRow[]): LeastSquaresProblem {
  const p = path.parameters
  const position = new Float64Array(2 + 2 * p)
  const buffer = rowBuffer()
  return {
    parameters: p,
    rows: rows.reduce((sum, row) => sum + row.rows, 0),
    evaluate(values, residuals, jacobian) {
      if (!path.prepare(values)) return false
      let at = 0
      for (const row of rows) {
        path.at(row.measure.epochYr, position, jacobian !== null)
        if (!evaluateRow(row, position[0]!, position[1]!, buffer)) return false
        residuals[at] = buffer.r1
        if (jacobian) chain(jacobian, at * p, p, buffer.r1x, buffer.r1y, position)
        at++
        if (row.rows === 1) continue
        residuals[at] = buffer.r2
        if (jacobian) chain(jacobian, at * p, p, buffer.r2x, buffer.r2y, position)
        at++
      }
      return true
    },
  }
}
