import type { NormalPoint } from '../types'

/**
 * What to say about normal points.
 * @param points of the fit; left out where it went through single measures.
 * @param places that were fitted.
 * @returns sentences.
 */
export function aboutNormalPoints(points: readonly NormalPoint[] | undefined, places: number): string[] {
  if (points === undefined) return []
  const members = points.reduce((sum, point) => sum + point.members.length, 0)
  return [`${members} measures stand in ${points.length} normal points of at most a fiftieth of the period; χ² and degrees of freedom are those of ${places} places, residuals those of the measures.`]
}
