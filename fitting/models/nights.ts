/**
 * The error of a mean of several nights where it was not stated.
 *   σ² = σ₁²/n + σ_sys²,  σ_sys = σ₁/2
 * σ₁ is what a night scatters by, σ_sys what all nights of an observer share. Without the second a mean of 16 nights would weigh sixteen
 * times a single night; with it 4 times.
 * Source: accidental and systematic parts of an error, common practice.
 */

/** σ_sys² over σ₁². */
const SYSTEMATIC_SQUARED = 0.25

/**
 * σ of a mean over the σ of one night.
 * @param nights n, ≥ 1.
 * @returns √((1/n + 1/4)/(1 + 1/4)): 1 for one night, falling to 0.447.
 * Source: common practice.
 */
export function nightsFactor(nights: number): number {
  return nights === 1 ? 1 : Math.sqrt((1 / nights + SYSTEMATIC_SQUARED) / (1 + SYSTEMATIC_SQUARED))
}

/**
 * What to say about nights.
 * @param counted measures whose nights shaped an error.
 * @returns a sentence, or none.
 */
export function aboutNights(counted: number): string[] {
  if (counted === 0) return []
  const which = counted === 1 ? 'One measure states' : `${counted} measures state`
  return [`${which} a number of nights but no error: σ² = σ₁²/n + (σ₁/2)² was taken for it. A stated error is that of the mean as given, and nights do not change it.`]
}
