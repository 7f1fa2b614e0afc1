/**
 * How bright the body is at 1 au from Sun and Earth, from the magnitudes that were measured with the places.
 *   minor planets: H = m − 5 log₁₀(rΔ) + 2.5 log₁₀((1 − G)Φ₁ + GΦ₂), Φᵢ = exp(−Aᵢ tan(α/2)^Bᵢ), G = 0.15, A = 3.33, 1.87, B = 0.63, 1.22
 *   comets: H = m − 5 log₁₀ Δ − 10 log₁₀ r
 * with r, Δ the distances from Sun and observer (au) and α the phase angle. The mean over the used measures of the band with most of them; σ is that of the
 * mean, from the scatter.
 * Source: Bowell et al. 1989, in Asteroids II, p. 524 (IAU Commission 20, 1985); comets: common practice.
 */
import { cos, exp, log, sin } from '../elementary'
import type { Element } from '../types'

export interface MeasuredBrightness {
  magnitude: number
  band: string
  distanceAu: number
  sunDistanceAu: number
  /** α, rad. */
  phaseRad: number
}

const SLOPE = 0.15
/** A comet from this eccentricity on. */
const COMET_FROM_E = 0.9
const LN_10 = log(10)

const lg = (x: number) => log(x) / LN_10
const power = (x: number, exponent: number) => (x > 0 ? exp(exponent * log(x)) : 0)

/** Brightness lost by the phase, mag, ≥ 0. */
function phaseLoss(phaseRad: number): number {
  const t = sin(phaseRad / 2) / Math.max(cos(phaseRad / 2), 1e-6)
  const first = exp(-3.33 * power(t, 0.63))
  const second = exp(-1.87 * power(t, 1.22))
  return -2.5 * lg(Math.max((1 - SLOPE) * first + SLOPE * second, 1e-12))
}

/** The band with most magnitudes; of equals the first by code units. */
function usualBand(measured: readonly MeasuredBrightness[]): string {
  const counts = new Map<string, number>()
  for (const { band } of measured) counts.set(band, (counts.get(band) ?? 0) + 1)
  return [...counts].sort((a, b) => b[1] - a[1] || (a[0] < b[0] ? -1 : 1))[0]![0]
}

/**
 * Absolute magnitude.
 * @param measured used measures that carry a magnitude.
 * @param eccentricity of the orbit: comets from 0.9 on.
 * @returns the element's name and the element; null without magnitudes.
 * Source: Bowell et al. 1989, Asteroids II, p. 524.
 */
export function absoluteMagnitude(measured: readonly MeasuredBrightness[], eccentricity: number): { name: 'absoluteMagnitude' | 'totalMagnitude'; element: Element } | null {
  if (measured.length === 0) return null
  const isComet = eccentricity >= COMET_FROM_E
  const band = usualBand(measured)
  const values = measured.filter((one) => one.band === band).map(({ magnitude, distanceAu, sunDistanceAu, phaseRad }) => (isComet
    ? magnitude - 5 * lg(distanceAu) - 10 * lg(sunDistanceAu)
    : magnitude - 5 * lg(distanceAu * sunDistanceAu) - phaseLoss(phaseRad)))
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length
  const sigma = values.length > 1 ? Math.sqrt(values.reduce((sum, value) => sum + (value - mean) * (value - mean), 0) / (values.length - 1) / values.length) : null
  return {
    name: isComet ? 'totalMagnitude' : 'absoluteMagnitude',
    element: { value: mean, sigma, sigmaFormal: null, sigmaScaled: sigma, unit: band === '' ? 'mag' : `mag ${band}` },
  }
}
