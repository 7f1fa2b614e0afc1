/** Conics from directions and distances: published elements, tables and real distances. Sources stand at each check. */
import { describe, expect, it } from 'vitest'
import { fitOrbit, type FitResult, type FitSettings, type PlaneMeasure } from '../../fitting'
import { readFixture } from './published'

const DEG = Math.PI / 180

function fitted(measures: Omit<PlaneMeasure, 'id' | 'observer'>[], settings: FitSettings = {}): FitResult {
  const outcome = fitOrbit({ kind: 'plane', measures: measures.map((measure, i) => ({ id: `m${i}`, observer: 'table', ...measure })), settings })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

function pick(result: FitResult) {
  const p = result.elements.semiLatusRectum!.value
  const e = result.elements.eccentricity!.value
  return { p, e, a: p / (1 - e * e), direction: result.elements.periapsisDirection!.value }
}

describe('planets from mean elements, noise-free (Simon et al. 1994, A&A 282, 663)', () => {
  const PLANETS = [
    { planet: 'Earth', p: 0.999721839059, e: 0.0167086342, direction: 102.93734808, a: 1.0000010178 },
    { planet: 'Mars', p: 1.510387249389, e: 0.0934006477, direction: 336.06023395, a: 1.5236793419 },
    { planet: 'Mercury', p: 0.370730083186, e: 0.2056317526, direction: 77.45611904, a: 0.3870983098 },
  ]
  it.each(PLANETS)('gives $planet back', ({ planet, p, e, direction, a }) => {
    const rows = readFixture('checks/polar_planets_exact.csv').filter((row) => row.planet === planet)
    const result = fitted(rows.map((row) => ({ phiRad: Number(row.phi_deg_heliocentric_longitude_in_orbit) * DEG, r: Number(row.r_au) })))
    const found = pick(result)
    expect(rows).toHaveLength(24)
    expect(Math.abs(found.p - p)).toBeLessThanOrEqual(1e-10)
    expect(Math.abs(found.e - e)).toBeLessThanOrEqual(1e-10)
    expect(Math.abs(found.direction - direction)).toBeLessThanOrEqual(1e-7)
    expect(Math.abs(found.a - a)).toBeLessThanOrEqual(1e-9)
    expect(result.conic!.class).toBe('ellipse')
  })
})

describe('planets from mean elements with times by the mean motion of the same a (Simon et al. 1994; μ of the Sun 4π² au³ a Julian year² to 1e-5)', () => {
  it.each([['Earth', 1.0000010178, 0.0167086342], ['Mars', 1.5236793419, 0.0934006477], ['Mercury', 0.3870983098, 0.2056317526]] as const)('gives the period and the passage of perihelion of %s back', (planet, a, e) => {
    const rows = readFixture('checks/polar_planets_exact.csv').filter((row) => row.planet === planet)
    const period = a ** 1.5
    const direction = { Earth: 102.93734808, Mars: 336.06023395, Mercury: 77.45611904 }[planet]
    const measures = rows.map((row) => {
      const nu = (Number(row.phi_deg_heliocentric_longitude_in_orbit) - direction) * DEG
      const anomaly = 2 * Math.atan(Math.sqrt((1 - e) / (1 + e)) * Math.tan(nu / 2))
      return { phiRad: nu + direction * DEG, r: Number(row.r_au), epochYr: 2000 + (period * (anomaly - e * Math.sin(anomaly))) / (2 * Math.PI) }
    })
    const result = fitted(measures, { radiusUnit: 'au' })
    expect(Math.abs(result.elements.period!.value / period - 1)).toBeLessThanOrEqual(1e-9)
    const turns = (result.elements.periapsisTime!.value - 2000) / period
    expect(Math.abs(turns - Math.round(turns))).toBeLessThanOrEqual(1e-8)
    expect(Math.abs(result.elements.eccentricity!.value - e)).toBeLessThanOrEqual(1e-9)
    expect(Math.abs(result.constants!.gravitationalParameter.value / (4 * Math.PI ** 2) - 1)).toBeLessThanOrEqual(1e-9)
  })
})

describe('real distances of Mars with their dates (Bretagnon & Francou 1988, VSOP87)', () => {
  const rows = readFixture('checks/polar_mars_vsop.csv')
  const result = fitted(rows.map((row) => ({ phiRad: Number(row.phi_deg) * DEG, r: Number(row.r_au), epochYr: 2000 + (Number(row.jd_tdb) - 2451545) / 365.25 })), { radiusUnit: 'au' })

  it('gives the sidereal period of Mars, 686.98 d, the longest of the periods that dates at equal intervals allow', () => {
    expect(Math.abs(result.elements.period!.value * 365.25 - 686.98)).toBeLessThan(0.1)
    expect(result.alternatives.length).toBeGreaterThan(0)
    expect(result.alternatives.every((other) => other.elements.period!.value < result.elements.period!.value)).toBe(true)
  })

  it('gives the perihelion of 1999 November 25 to half a day, and the Sun\'s gravitational parameter to a part in 2000', () => {
    const periodYr = result.elements.period!.value
    const turns = (result.elements.periapsisTime!.value - 1999.9) / periodYr
    expect(Math.abs(turns - Math.round(turns)) * periodYr).toBeLessThan(0.01)
    expect(Math.abs(result.constants!.gravitationalParameter.value / (4 * Math.PI ** 2) - 1)).toBeLessThan(5e-4)
  })

  it('keeps e and a of the fit without times within the perturbations', () => {
    const found = pick(result)
    expect(Math.abs(found.e - 0.093394)).toBeLessThan(3e-4)
    expect(Math.abs(found.a - 1.523646)).toBeLessThan(3e-4)
  })
})

describe('real distances of Mars over one revolution (Bretagnon & Francou 1988, VSOP87; solution computed for this check)', () => {
  const rows = readFixture('checks/polar_mars_vsop.csv')
  const result = fitted(rows.map((row) => ({ phiRad: Number(row.phi_deg) * DEG, r: Number(row.r_au) })), { radiusUnit: 'au' })
  const found = pick(result)

  it('gives e, a and the perihelion of the independent solution', () => {
    expect(Math.abs(found.e - 0.093394)).toBeLessThanOrEqual(2e-6)
    expect(Math.abs(found.a - 1.523646)).toBeLessThanOrEqual(2e-6)
    expect(Math.abs(found.direction - 336.0175)).toBeLessThanOrEqual(1e-4)
  })

  it('agrees with the published mean elements (Simon et al. 1994) within the perturbations', () => {
    expect(Math.abs(found.e - 0.0934006)).toBeLessThanOrEqual(2e-4)
    expect(Math.abs(found.a - 1.5236793)).toBeLessThanOrEqual(2e-4)
  })

  it('leaves a residual standard deviation of 44.31e-6 au, in the unit that was named', () => {
    const { rms, used, degreesOfFreedom } = result.statistics
    expect(Math.abs(rms.r!.value * Math.sqrt(used / degreesOfFreedom) * 1e6 - 44.31)).toBeLessThanOrEqual(0.01)
    expect(result.statistics.rms.r!.unit).toBe('au')
  })
})

describe('the Sun’s apparent diameter through a year (semi-diameter 959.63″ at 1 au: IAU 1976; e: Simon et al. 1994)', () => {
  const rows = readFixture('checks/polar_sun_diameter.csv')
  const directions = rows.map((row) => Number(row.sun_longitude_deg_of_date) * DEG)

  it('gives the eccentricity of the Earth’s orbit from diameters rounded to 0.01′', () => {
    const result = fitted(rows.map((row, i) => ({ phiRad: directions[i]!, diameterArcmin: Number(row.apparent_diameter_arcmin) })))
    const found = pick(result)
    expect(Math.abs(found.e - 0.01672)).toBeLessThanOrEqual(1e-5)
    expect(Math.abs(found.e - 0.01671)).toBeLessThanOrEqual(2e-4)
    expect(Math.abs(found.direction - 283.3)).toBeLessThanOrEqual(1.5)
    expect(result.warnings.join(' ')).toContain('No scale was stated')
  })

  it('gives distances in au with the stated scale', () => {
    const measures = rows.map((row, i) => ({ phiRad: directions[i]!, diameterArcmin: Number(row.apparent_diameter_arcmin) }))
    const result = fitted(measures, { diameterScaleArcmin: (2 * 959.63) / 60, radiusUnit: 'au' })
    expect(Math.abs(pick(result).a - 1)).toBeLessThan(2e-4)
    expect(result.elements.semiLatusRectum!.unit).toBe('au')
  })

  it('gives the same eccentricity from the table’s relative distances, which come from the same rounded diameters', () => {
    const result = fitted(rows.map((row, i) => ({ phiRad: directions[i]!, r: Number(row.relative_r) })))
    expect(Math.abs(pick(result).e - 0.01672)).toBeLessThanOrEqual(1e-5)
  })
})

describe('Mars by its distances at aphelion and perihelion (Kepler 1609, Astronomia nova, ch. 42)', () => {
  it('gives e = 0.09264 and a = 1.5264 once a third distance of that ellipse is added', () => {
    // Two apsides alone leave the semi-latus rectum's direction open; the third point is r = p at right angles to the apsides.
    const [aphelion, perihelion] = [1.6678, 1.385]
    const p = (2 * aphelion * perihelion) / (aphelion + perihelion)
    const found = pick(fitted([{ phiRad: 0, r: perihelion }, { phiRad: Math.PI, r: aphelion }, { phiRad: Math.PI / 2, r: p }]))
    expect(Math.abs(found.e - 0.09264)).toBeLessThanOrEqual(6e-6)
    expect(Math.abs(found.a - 1.5264)).toBeLessThanOrEqual(1e-9)
  })
})

describe('open conics, noise-free (q and e partly from Meeus 1998, Astronomical Algorithms, p. 247; table computed for this check)', () => {
  const CASES = [
    { name: 'parabola', p: 1.842652, e: 1, direction: 40, kind: 'parabola' },
    { name: 'hyperbola', p: 6.92067357333, e: 1.05731, direction: 200, kind: 'hyperbola' },
    { name: 'hyperbola strong', p: 3.8674194, e: 1.6, direction: 300, kind: 'hyperbola' },
  ]
  it.each(CASES)('gives the $name back', ({ name, p, e, direction, kind }) => {
    const rows = readFixture('checks/polar_open_conics.csv').filter((row) => row.case === name)
    const result = fitted(rows.map((row) => ({ phiRad: Number(row.phi_deg) * DEG, r: Number(row.r) })))
    const found = pick(result)
    expect(rows).toHaveLength(15)
    expect(Math.abs(found.p - p)).toBeLessThanOrEqual(1e-9)
    expect(Math.abs(found.e - e)).toBeLessThanOrEqual(1e-9)
    expect(Math.abs(found.direction - direction)).toBeLessThanOrEqual(1e-7)
    expect(result.conic!.class).toBe(kind)
  })
})
