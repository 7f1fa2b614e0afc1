/** A path of the companion about the primary on the sky, with x towards north and y towards east, arcsec. */
export interface SkyPath {
  readonly parameters: number
  /** Takes new parameter values; false where the path is not defined for them. */
  prepare(values: ArrayLike<number>): boolean
  /**
   * Position at an epoch, Julian year: out[0] = x north, out[1] = y east, arcsec; and, where asked, the partial derivatives
   * out[2 … 1 + p] = ∂x and out[2 + p … 1 + 2p] = ∂y.
   */
  at(epochYr: number, out: Float64Array, withPartials: boolean): void
}
