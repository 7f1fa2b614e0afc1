import { describe, expect, it } from 'vitest'
import { fitOrbit, type EquatorialMeasure, type FitResult } from '../../fitting'
import { elementsFromState, meanMotion } from '../../fitting/conic'
import { moveInto } from '../../fitting/conic/universal'
import { refinedAngleOrbit, roughAngleOrbits, type AngleProblem, type Direction } from '../../fitting/search/gauss-angles'
import { joinInto } from '../../fitting/search/lambert'
import { cell, checkAgainst, readFixture } from './published'

const DEG = Math.PI / 180
const K2 = 0.01720209895 ** 2
const EARTH = 398600.4418
const dms = (degrees: number, minutes: number, seconds: number) => (degrees + minutes / 60 + seconds / 3600) * DEG
const once = <T>(make: () => T) => {
  let made: T | undefined
  return () => (made ??= make())
}

function toward(longitude: number, latitude: number): [number, number, number] {
  return [Math.cos(latitude) * Math.cos(longitude), Math.cos(latitude) * Math.sin(longitude), Math.sin(latitude)]
}

function vectors(state: Float64Array) {
  return { place: [state[0]!, state[1]!, state[2]!] as const, velocity: [state[3]!, state[4]!, state[5]!] as const }
}

describe('motion by universal variables', () => {
  const after = once(() => {
    const out = new Float64Array(6)
    moveInto([1131.34, -2282.343, 6672.423, -5.64305, 4.30333, 2.42879], EARTH, 2400, out)
    return out
  })
  checkAgainst('Vallado 2013, Fundamentals of Astrodynamics and Applications, 4th ed., Example 2-4 (40 min later)', [
    { quantity: 'x (km)', expected: -4219.7527, tolerance: 0.003, computed: () => after()[0]! },
    { quantity: 'y (km)', expected: 4363.0292, tolerance: 0.003, computed: () => after()[1]! },
    { quantity: 'z (km)', expected: -3958.7666, tolerance: 0.003, computed: () => after()[2]! },
    { quantity: 'vx (km/s)', expected: 3.689866, tolerance: 3e-6, computed: () => after()[3]! },
    { quantity: 'vy (km/s)', expected: -1.916735, tolerance: 3e-6, computed: () => after()[4]! },
    { quantity: 'vz (km/s)', expected: -6.112511, tolerance: 3e-6, computed: () => after()[5]! },
  ])
})

describe('two places and the time between', () => {
  const satellite = once(() => {
    const out = new Float64Array(6)
    joinInto([15945.34, 0, 0], [12214.83399, 10249.46731, 0], 76 * 60, { mu: EARTH, isLongWay: false }, out)
    return out
  })
  checkAgainst('Vallado 2013, Fundamentals of Astrodynamics and Applications, 4th ed., Example 7-5', [
    { quantity: 'vx at the first place (km/s)', expected: 2.058925, tolerance: 3e-5, computed: () => satellite()[0]! },
    { quantity: 'vy at the first place (km/s)', expected: 2.915956, tolerance: 3e-5, computed: () => satellite()[1]! },
    { quantity: 'vx at the second place (km/s)', expected: -3.451569, tolerance: 3e-5, computed: () => satellite()[3]! },
    { quantity: 'vy at the second place (km/s)', expected: 0.910301, tolerance: 3e-4, computed: () => satellite()[4]! },
  ])

  const juno = once(() => {
    const [r1, r2, angle] = [10 ** 0.330764, 10 ** 0.3222239, dms(7, 34, 53.73)]
    const out = new Float64Array(6)
    joinInto([r1, 0, 0], [r2 * Math.cos(angle), r2 * Math.sin(angle), 0], 21.93391, { mu: K2, isLongWay: false }, out)
    return elementsFromState({ place: [r1, 0, 0], velocity: [out[0]!, out[1]!, out[2]!] }, K2)
  })
  checkAgainst('Gauss 1809, Theoria motus corporum coelestium, arts. 96, 97 and 155 (Juno; log a from memory)', [
    { quantity: 'φ = arcsin e (deg)', expected: 14.20051944444, tolerance: 3e-4, computed: () => Math.asin(juno().eccentricity) / DEG },
    { quantity: 'true anomaly (deg)', expected: 310.9249, tolerance: 0.003, computed: () => juno().trueAnomalyRad / DEG },
    { quantity: 'log₁₀ a', expected: 0.4224389, tolerance: 3e-6, computed: () => Math.log10(juno().semiLatusRectum / (1 - juno().eccentricity ** 2)) },
  ])
})

describe('three directions to a satellite from a station', () => {
  const [phi, flattening, radius] = [40 * DEG, 1 / 298.26, 6378]
  const curvature = radius / Math.sqrt(1 - (2 * flattening - flattening ** 2) * Math.sin(phi) ** 2)
  const rows = [[0, 43.5365, -8.78334, 44.5065], [118.104, 54.4196, -12.0739, 45], [237.577, 64.3178, -15.1054, 45.4992]] as const
  const directions = rows.map(([time, ra, dec, sidereal]): Direction => {
    const level = (curvature + 1) * Math.cos(phi)
    return { time, line: toward(ra * DEG, dec * DEG), observer: [level * Math.cos(sidereal * DEG), level * Math.sin(sidereal * DEG), (curvature * (1 - flattening) ** 2 + 1) * Math.sin(phi)] }
  })
  const problem = { directions, mu: 398600, lightSpeed: Infinity } as unknown as AngleProblem
  const rough = once(() => roughAngleOrbits(problem))
  const refined = once(() => vectors(refinedAngleOrbit(problem, rough()[0]!).state))
  const elements = once(() => elementsFromState(refined(), 398600))
  it('have one root of the equation of the eighth degree', () => {
    expect(rough()).toHaveLength(1)
  })
  checkAgainst('Curtis 2014, Orbital Mechanics for Engineering Students, 3rd ed., Example 5.12 (results from memory)', [
    { quantity: 'x (km)', expected: 5662.04, tolerance: 0.05, computed: () => refined().place[0] },
    { quantity: 'y (km)', expected: 6537.95, tolerance: 0.05, computed: () => refined().place[1] },
    { quantity: 'z (km)', expected: 3269.05, tolerance: 0.05, computed: () => refined().place[2] },
    { quantity: 'vx (km/s)', expected: -3.88542, tolerance: 6e-5, computed: () => refined().velocity[0] },
    { quantity: 'vy (km/s)', expected: 5.12141, tolerance: 6e-5, computed: () => refined().velocity[1] },
    { quantity: 'vz (km/s)', expected: -2.2434, tolerance: 6e-5, computed: () => refined().velocity[2] },
    { quantity: 'e', expected: 0.0999909, tolerance: 1e-5, computed: () => elements().eccentricity },
    { quantity: 'Ω (deg)', expected: 269.999, tolerance: 0.002, computed: () => elements().nodeRad / DEG },
    { quantity: 'i (deg)', expected: 29.9996, tolerance: 0.002, computed: () => elements().inclinationRad / DEG },
    { quantity: 'ω (deg)', expected: 89.9723, tolerance: 0.02, computed: () => elements().argumentOfPeriapsisRad / DEG },
    { quantity: 'ν (deg)', expected: 45.0284, tolerance: 0.02, computed: () => elements().trueAnomalyRad / DEG },
    { quantity: 'a (km)', expected: 9999.48, tolerance: 0.3, computed: () => elements().semiLatusRectum / (1 - elements().eccentricity ** 2) },
  ])
})

describe('Juno in October 1804', () => {
  const rows = [
    [5.458644, dms(354, 44, 31.60), -dms(4, 59, 31.06), dms(12, 28, 27.76), 9.9996826],
    [17.421885, dms(352, 34, 22.12), -dms(6, 21, 55.07), dms(24, 19, 49.05), 9.9980979],
    [27.393077, dms(351, 34, 30.01), -dms(7, 17, 50.95), dms(34, 16, 9.65), 9.9969678],
  ] as const
  const directions = rows.map(([time, longitude, latitude, earth, logR]): Direction => ({
    time, line: toward(longitude, latitude), observer: [10 ** (logR - 10) * Math.cos(earth), 10 ** (logR - 10) * Math.sin(earth), 0],
  }))
  const problem = { directions, mu: K2, lightSpeed: 173.1446 } as unknown as AngleProblem
  const orbit = once(() => {
    const elements = elementsFromState(vectors(refinedAngleOrbit(problem, roughAngleOrbits(problem)[0]!).state), K2)
    const a = elements.semiLatusRectum / (1 - elements.eccentricity ** 2)
    const motion = meanMotion({ periapsisDistance: a * (1 - elements.eccentricity), eccentricity: elements.eccentricity, gravitationalParameter: K2 })
    return { ...elements, a, motion }
  })
  checkAgainst('Gauss 1809, Theoria motus corporum coelestium, arts. 150–155 (a and n from memory)', [
    { quantity: 'Ω (deg)', expected: 171.1302027778, tolerance: 0.006, computed: () => orbit().nodeRad / DEG },
    { quantity: 'i (deg)', expected: 13.11225, tolerance: 0.001, computed: () => orbit().inclinationRad / DEG },
    { quantity: 'longitude of perihelion (deg)', expected: 52.30258333333, tolerance: 0.02, computed: () => ((orbit().nodeRad + orbit().argumentOfPeriapsisRad) / DEG) % 360 },
    { quantity: 'φ = arcsin e (deg)', expected: 14.20051944444, tolerance: 0.004, computed: () => Math.asin(orbit().eccentricity) / DEG },
    { quantity: 'mean daily motion (arcsec)', expected: 824.7989, tolerance: 0.06, computed: () => orbit().motion / DEG * 3600 },
    { quantity: 'log₁₀ a', expected: 0.4224389, tolerance: 2e-5, computed: () => Math.log10(orbit().a) },
  ])
})

describe('the minor planet (12893) at its opposition of 1998, 24 places over 77 days', () => {
  // Longitude east (deg), ρ cos φ′, ρ sin φ′ of the stations, as the Minor Planet Center lists them.
  const stations: Record<string, EquatorialMeasure['site']> = {
    691: { longitudeEastDeg: 248.401, rhoCosPhi: 0.84951, rhoSinPhi: 0.52642 },
    699: { longitudeEastDeg: 248.46331, rhoCosPhi: 0.81938, rhoSinPhi: 0.57193 },
    704: { longitudeEastDeg: 253.34093, rhoCosPhi: 0.831869, rhoSinPhi: 0.553542 },
    910: { longitudeEastDeg: 6.9267, rhoCosPhi: 0.72368, rhoSinPhi: 0.68811 },
  }
  const sexagesimal = (text: string) => text.replace(/^[+-]/, '').split(' ').map(Number).reduce((sum, part, i) => sum + part / 60 ** i, 0)
  const fit = once((): FitResult => {
    const measures = readFixture('checks/astrometry_12893_1998.csv').map((row, i): EquatorialMeasure => ({
      id: `place ${i}`, observer: row.station!, station: row.station!, site: stations[row.station!]!, jdUtc: cell(row, 'jd_utc'),
      raRad: sexagesimal(row.ra_hms!) * 15 * DEG, decRad: (row.dec_dms!.startsWith('-') ? -1 : 1) * sexagesimal(row.dec_dms!) * DEG,
    }))
    const outcome = fitOrbit({ kind: 'equatorial', measures, settings: { forces: 'sun' } })
    if (!outcome.ok) throw new Error(outcome.refusal.sentence)
    return outcome.result
  })
  const value = (name: string) => fit().elements[name]!.value
  const rms = () => Math.sqrt((fit().statistics.rms.raCosDecArcsec!.value ** 2 + fit().statistics.rms.decArcsec!.value ** 2) / 2)
  checkAgainst('the astrometry of that opposition as published by the Minor Planet Center', [
    { quantity: 'a (au)', expected: 2.828823, tolerance: 1e-5, standing: 'own', computed: () => value('semiMajorAxis') },
    { quantity: 'e', expected: 0.069146, tolerance: 1.5e-5, standing: 'own', computed: () => value('eccentricity') },
    { quantity: 'i (deg)', expected: 2.324001, tolerance: 3e-5, standing: 'own', computed: () => value('inclination') },
    { quantity: 'Ω (deg)', expected: 185.777628, tolerance: 4e-4, standing: 'own', computed: () => value('node') },
    { quantity: 'ω (deg)', expected: 182.1264, tolerance: 0.015, standing: 'own', computed: () => value('argumentOfPerihelion') },
    { quantity: 'M (deg) at JD 2451100.5', expected: 22.966198, tolerance: 0.013, standing: 'own', computed: () => value('meanAnomaly') + value('meanMotion') * (2451100.5 - fit().epochOfElements!) },
    { quantity: 'rms a coordinate (arcsec)', expected: 0.421, tolerance: 0.005, standing: 'own', computed: rms },
    { quantity: 'σ of a (au)', expected: 8.51e-5, tolerance: 0.03 * 8.51e-5, standing: 'own', computed: () => fit().elements.semiMajorAxis!.sigma! },
    { quantity: 'σ of Ω (deg)', expected: 3.58e-3, tolerance: 0.03 * 3.58e-3, standing: 'own', computed: () => fit().elements.node!.sigma! },
  ])
})
