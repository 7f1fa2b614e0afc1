import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { degFromRad, formatArcsec, formatDirection, formatEpoch, formatPositionAngle, formatResidual, formatResidualMas, formatSeparation, radFromDeg } from '../../../../shared/units/angles'
import { formatFileSize } from '../../../../shared/units/file-size'
import { joinWords } from '../../../../shared/units/list-text'
import { formatDigits, formatNumber, formatSigned } from '../../../../shared/units/number-text'
import { unitSymbol } from '../../../../shared/units/unit-symbol'
import { elementCells, formatElement, formatValueAndSigma } from '../../../../shared/units/value-and-sigma'

const element = (value: number, sigma: number | null, unit: string) => ({ value, sigma, sigmaFormal: sigma, sigmaScaled: sigma, unit })

describe('numbers', () => {
  it('have a real minus sign and no negative zero', () => {
    expect(formatNumber(-4.664, 2)).toBe('−4.66')
    expect(formatNumber(-0.001, 2)).toBe('0.00')
    expect(formatNumber(1234.5, -2)).toBe('1200')
    expect(formatNumber(Number.NaN, 2)).toBe('—')
  })

  it('carry their sign in any case where they are residuals', () => {
    expect([0.0214, -0.0214, 0.0004, -0.0004, 0].map(value => formatSigned(value, 3))).toEqual(['+0.021', '−0.021', '0.000', '0.000', '0.000'])
    expect(formatResidualMas(-0.0071)).toBe('−7')
    expect(formatResidual(null)).toBe('—')
  })

  it('keep their significant digits', () => {
    expect([0.048221, 188.4, 1000, -0.5, 0, 99.96].map(value => formatDigits(value, 3))).toEqual(['0.0482', '188', '1000', '−0.500', '0.00', '100'])
    expect(formatDigits(4.1e-9, 2)).toBe('4.1e-9')
  })
})

describe('a value and its standard error', () => {
  it.each([
    [62.4137, 0.3821, '62.41', '0.38'],
    [2009.31188, 0.0412, '2009.312', '0.041'],
    [0.48223, 0.00312, '0.4822', '0.0031'],
    [188.3, 21.4, '188', '21'],
    [1234.4, 213, '1230', '210'],
    [5.123456, 0.0996, '5.12', '0.10'],
    [-1.4, 0.2, '−1.40', '0.20'],
    [3.25, 9.96, '3', '10'],
  ])('%f with σ %f are written with the same decimals', (value, sigma, valueText, sigmaText) => {
    expect(formatValueAndSigma(value, sigma)).toEqual({ value: valueText, sigma: sigmaText })
  })

  it('without an error keeps five digits and shows none', () => {
    for (const none of [null, 0, Number.NaN]) expect(formatValueAndSigma(0.861234, none)).toEqual({ value: '0.86123', sigma: null })
    expect([0.5, 10, -1.25, 0, 123456].map(value => formatValueAndSigma(value, null).value)).toEqual(['0.5', '10', '−1.25', '0', '123460'])
  })

  it('with an error too small to show says so', () => {
    expect(formatValueAndSigma(0.5, 1e-14)).toEqual({ value: '0.500000000', sigma: '<0.000000001' })
  })

  it('always shows the same count of decimals for both', () => {
    fc.assert(fc.property(fc.double({ min: -1e6, max: 1e6, noNaN: true }), fc.double({ min: 1e-8, max: 1e5, noNaN: true }), (value, sigma) => {
      const text = formatValueAndSigma(value, sigma)
      const decimals = (written: string) => written.split('.')[1]?.length ?? 0
      expect(decimals(text.value)).toBe(decimals(text.sigma!))
      expect(Math.abs(Number(text.sigma) - sigma)).toBeLessThanOrEqual(0.051 * sigma)
    }), { seed: 7, numRuns: 1000 })
  })

  it('stands with its unit as the trade writes it', () => {
    expect(formatElement(element(62.41, 0.38, 'yr'))).toBe('62.41 ± 0.38 yr')
    expect(formatElement(element(0.861, 0.004, 'arcsec'))).toBe('0.8610 ± 0.0040″')
    expect(formatElement(element(103.4, 3.1, 'deg'))).toBe('103.4 ± 3.1°')
    expect(formatElement(element(0.5, null, ''))).toBe('0.5')
    expect(formatElement(element(2009.3, 0.04, 'Julian year'))).toBe('2009.300 ± 0.040 yr')
    expect(unitSymbol('constructor')).toBe('constructor')
  })
})

describe('angles and separations', () => {
  it('come back from radians as they went in', () => {
    fc.assert(fc.property(fc.double({ min: -720, max: 720, noNaN: true }), deg => Math.abs(degFromRad(radFromDeg(deg)) - deg) <= 1e-12 * Math.abs(deg) + 1e-300), { seed: 7 })
  })

  it('run from 0 to below 360 degrees', () => {
    expect([361, -10, 359.999, 0, 360].map(angle => formatDirection(angle, 2))).toEqual(['1.00', '350.00', '0.00', '0.00', '0.00'])
    expect(formatPositionAngle(78.42)).toBe('78.4°')
    expect(formatDirection(null)).toBe('—')
  })

  it('go to milliarcseconds below a tenth of an arcsecond', () => {
    expect(formatSeparation(0.8612)).toBe('0.861″')
    expect(formatSeparation(0.03824)).toBe('38.2 mas')
    expect(formatArcsec(0.2384)).toBe('0.238')
    expect(formatEpoch(2012.2581)).toBe('2012.258')
    expect(formatEpoch(null)).toBe('—')
  })
})

describe('sizes and lists', () => {
  it('read as a person would say them', () => {
    expect([1, 812, 2413, 31_400_000].map(formatFileSize)).toEqual(['1 byte', '812 bytes', '2.4 kB', '31 MB'])
    expect([[], ['a'], ['a', 'b'], ['a', 'b', 'c']].map(joinWords)).toEqual(['', 'a', 'a and b', 'a, b and c'])
  })
})

describe('an element in a table', () => {
  it('has a time of perihelion as a day with its decimals and a magnitude without its band: month and band go to the words', () => {
    expect(elementCells(element(2461142.81436, 0.021, 'JD TT'))).toEqual({ value: '12.314', sigma: '0.021', unit: 'd', addition: '2026 Apr' })
    expect(elementCells(element(2461142.81436, null, 'JD TT'))).toEqual({ value: '12.31', sigma: null, unit: 'd', addition: '2026 Apr' })
    expect(elementCells(element(9.192, 0.017, 'mag G'))).toEqual({ value: '9.192', sigma: '0.017', unit: 'mag', addition: 'G' })
    expect(elementCells(element(64.21, 0.03, 'deg'))).toEqual({ value: '64.210', sigma: '0.030', unit: '°', addition: '' })
  })
})
