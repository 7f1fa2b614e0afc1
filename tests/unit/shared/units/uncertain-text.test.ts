import { describe, expect, it } from 'vitest'
import { decimalsFor, formatUncertain, formatValue } from '../../../../shared/units/uncertain-text'

describe('formatUncertain', () => {
  it('writes value and error with the same decimals, the error to two digits', () => {
    expect(formatUncertain(62.4131, 0.3813)).toBe('62.41 ± 0.38')
    expect(formatUncertain(0.01651, 0.00091)).toBe('0.01651 ± 0.00091')
    expect(formatUncertain(188.3, 21.2)).toBe('188 ± 21')
    expect(formatUncertain(18831.3, 2123.2)).toBe('18831 ± 2123')
  })

  it('gives an error that rounds up its next digit', () => {
    expect(formatUncertain(1.23456, 0.0996)).toBe('1.23 ± 0.10')
  })

  it('writes the value alone where no error is known', () => {
    expect(formatUncertain(2000, null)).toBe('2000')
    expect(formatUncertain(1.5, 0)).toBe('1.5')
    expect(formatUncertain(0.4820001, null)).toBe('0.482')
  })

  it('writes a true minus sign, and none before zero', () => {
    expect(formatUncertain(-1.234, 0.12)).toBe('−1.23 ± 0.12')
    expect(formatValue(-0.001, 1.2)).toBe('0.0')
  })

  it('refuses what is not a number', () => {
    expect(() => formatValue(NaN, 1)).toThrow(RangeError)
  })
})

describe('decimalsFor', () => {
  it('has no answer without a usable error', () => {
    expect([null, 0, NaN, Infinity].map(decimalsFor)).toEqual([null, null, null, null])
    expect(decimalsFor(1e-300)).toBe(20)
  })
})
