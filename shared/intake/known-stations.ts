import type { MeasureSite } from '../../fitting/types'

/**
 * Observatories whose place is known by their code: longitude east and the parallax constants ρ cos φ′ and ρ sin φ′ in equatorial
 * radii of the Earth.
 *
 * Source: IAU list of observatory codes, its published parallax constants.
 */
const KNOWN: Record<string, MeasureSite> = {
  691: { longitudeEastDeg: 248.401, rhoCosPhi: 0.84951, rhoSinPhi: 0.52642 },
  699: { longitudeEastDeg: 248.46331, rhoCosPhi: 0.81938, rhoSinPhi: 0.57193 },
  703: { longitudeEastDeg: 249.26736, rhoCosPhi: 0.845315, rhoSinPhi: 0.533213 },
  704: { longitudeEastDeg: 253.34093, rhoCosPhi: 0.831869, rhoSinPhi: 0.553542 },
  910: { longitudeEastDeg: 6.9267, rhoCosPhi: 0.72368, rhoSinPhi: 0.68811 },
}

export const KNOWN_STATION_CODES = Object.keys(KNOWN)

export function knownStation(code: string): MeasureSite | null {
  return Object.hasOwn(KNOWN, code) ? KNOWN[code]! : null
}
