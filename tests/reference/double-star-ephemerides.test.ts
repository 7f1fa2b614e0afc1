import { describe, expect, it } from 'vitest'
import type { CampbellElements } from '../../fitting/conic'
import { apparentEccentricity, apparentPlace, eccentricAnomalyRad, meanAnomalyAt, thieleInnesFromCampbell } from '../../fitting/conic'
import { cell, checkAgainst, readFixture, turnDeg } from './published'

const DEG = Math.PI / 180

/** Campbell elements from the columns shared by the lists of orbits. */
function orbitOf(row: Record<string, string>, nodeColumn = 'node_deg'): CampbellElements {
  return {
    periodYr: cell(row, 'P_yr'),
    periastronTimeYr: cell(row, 'T_yr'),
    eccentricity: cell(row, 'e'),
    semiMajorAxisArcsec: cell(row, 'a_arcsec'),
    inclinationRad: cell(row, 'i_deg') * DEG,
    nodeRad: cell(row, nodeColumn) * DEG,
    argumentOfPeriastronRad: cell(row, 'omega_deg') * DEG,
  }
}

function placeDeg(orbit: CampbellElements, epochYr: number): { theta: number, rho: number } {
  const place = apparentPlace(orbit, epochYr)
  return { theta: place.positionAngleRad / DEG, rho: place.separationArcsec }
}

describe('η Coronae Borealis', () => {
  const orbit = { periodYr: 41.623, periastronTimeYr: 1934.008, eccentricity: 0.2763, semiMajorAxisArcsec: 0.907, inclinationRad: 59.025 * DEG, nodeRad: 23.717 * DEG, argumentOfPeriastronRad: 219.907 * DEG }
  checkAgainst('Meeus 1998, Astronomical Algorithms, 2nd ed., Example 57.a p. 398 (1980.0)', [
    { quantity: 'M (deg)', expected: 37.788, tolerance: 6e-4, computed: () => meanAnomalyAt(orbit, 1980) / DEG },
    { quantity: 'E (deg)', expected: 49.896, tolerance: 6e-4, computed: () => eccentricAnomalyRad(meanAnomalyAt(orbit, 1980), 0.2763) / DEG },
    { quantity: 'θ (deg)', expected: 318.4, tolerance: 0.05, computed: () => placeDeg(orbit, 1980).theta },
    { quantity: 'ρ (arcsec)', expected: 0.411, tolerance: 5e-4, computed: () => placeDeg(orbit, 1980).rho },
  ])
  checkAgainst('Meeus 1998, Astronomical Algorithms, 2nd ed., Example 57.b p. 400', [
    { quantity: 'eccentricity of the apparent ellipse', expected: 0.86, tolerance: 5e-4, computed: () => apparentEccentricity(orbit) },
  ])
})

describe('Worley & Heintz 1983, Fourth Catalog of Orbits of Visual Binary Stars (Publ. USNO 24, part 7)', () => {
  const rows = readFixture('orbits_cat4.csv')
  const numbers = [...new Set(rows.map(row => row.seq!))]

  it('the list holds 60 orbits at 20 epochs', () => {
    expect(numbers).toHaveLength(60)
    expect(rows).toHaveLength(1200)
  })

  it.each(numbers)('gives the printed Thiele-Innes constants and 20 places of orbit no. %s', (seq) => {
    for (const row of rows.filter(row => row.seq === seq)) {
      const orbit = orbitOf(row)
      const { a, b, f, g } = thieleInnesFromCampbell(orbit)
      const printed = [cell(row, 'A'), cell(row, 'B'), cell(row, 'F'), cell(row, 'G')]
      for (const [index, constant] of [a, b, f, g].entries()) expect(Math.abs(constant - printed[index]!)).toBeLessThanOrEqual(6e-5)
      // θ is referred to the equinox of the catalogue's node: nothing is precessed.
      const { theta, rho } = placeDeg(orbit, cell(row, 'epoch'))
      expect(Math.abs(rho - cell(row, 'rho_arcsec')), `ρ in ${row.epoch}`).toBeLessThanOrEqual(6e-4)
      if (rho > 0.02) expect(Math.abs(turnDeg(theta, cell(row, 'theta_deg'))), `θ in ${row.epoch}`).toBeLessThanOrEqual(0.02)
    }
  })
})

describe('Hartkopf, Mason & Worley 2001, Sixth Catalog of Orbits of Visual Binary Stars (AJ 122, 3472), edition about 2008', () => {
  const rows = readFixture('orbits_cat6.csv')
  const names = [...new Set(rows.map(row => `${row.wds} ${row.name}`))]

  it('the list holds 50 orbits at 5 epochs', () => {
    expect(names).toHaveLength(50)
    expect(rows).toHaveLength(250)
  })

  it.each(names)('gives the printed places of %s from 2005 to 2009', (name) => {
    for (const row of rows.filter(row => `${row.wds} ${row.name}` === name)) {
      // The printed θ stays in the equinox of the node, whichever it is.
      const { theta, rho } = placeDeg(orbitOf(row), cell(row, 'epoch'))
      expect(Math.abs(rho - cell(row, 'rho_arcsec')), `ρ in ${row.epoch}`).toBeLessThanOrEqual(6e-4)
      expect(Math.abs(turnDeg(theta, cell(row, 'theta_deg'))), `θ in ${row.epoch}`).toBeLessThanOrEqual(0.1)
    }
  })
})

describe('IAU Commission 26, Double Stars Information Circulars 138 (1999) to 161 (2007)', () => {
  const rows = readFixture('orbits_circulars.csv')
  const compared = rows.map((row) => {
    const orbit = orbitOf(row, 'node_deg_2000')
    const places = ['1', '2'].map(n => ({ printed: { theta: cell(row, `theta${n}`), rho: cell(row, `rho${n}`) }, ...placeDeg(orbit, cell(row, `epoch${n}`)) }))
    return { name: `${row.name} of Circular ${row.circular}`, places }
  })

  it('the list holds 27 orbits', () => {
    expect(rows).toHaveLength(27)
  })

  it.each(compared)('gives the two printed places of $name', ({ places }) => {
    for (const { printed, theta, rho } of places) {
      expect(Math.abs(turnDeg(theta, printed.theta))).toBeLessThanOrEqual(0.5)
      expect(Math.abs(rho - printed.rho)).toBeLessThanOrEqual(0.006)
    }
  })

  it('half of the position angles agree within 0.12 degrees', () => {
    const differences = compared.flatMap(({ places }) => places.map(({ printed, theta }) => Math.abs(turnDeg(theta, printed.theta)))).sort((a, b) => a - b)
    expect(differences[Math.floor(differences.length / 2)]).toBeLessThanOrEqual(0.12)
  })
})

describe('42 Comae Berenices, annual means of O. Struve 1829 to 1854', () => {
  // Measures: O. Struve 1875, MNRAS 35, 367. Orbit: Sixth Catalog, reference WSI2006b, node of 2000.
  const rows = readFixture('measures_42com_struve.csv')
  const orbit = { periodYr: 26.052, periastronTimeYr: 1989.2052, eccentricity: 0.5083, semiMajorAxisArcsec: 0.67633, inclinationRad: 90.098 * DEG, nodeRad: 192.235 * DEG, argumentOfPeriastronRad: 280.121 * DEG }
  const rms = (values: number[]) => Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length)
  const residuals = rows.map((row) => {
    const { theta, rho } = placeDeg(orbit, cell(row, 'epoch'))
    return { theta: turnDeg(cell(row, 'theta_deg'), theta), rho: cell(row, 'rho_arcsec') - rho }
  })
  checkAgainst('O. Struve 1875, MNRAS 35, 367, with the Sixth Catalog\'s orbit', [
    { quantity: 'rms O−C of θ (deg)', expected: 2.511, tolerance: 0.001, standing: 'own', computed: () => rms(residuals.map(r => r.theta)) },
    { quantity: 'rms O−C of ρ (arcsec)', expected: 0.1209, tolerance: 1e-4, standing: 'own', computed: () => rms(residuals.map(r => r.rho)) },
  ])
})
