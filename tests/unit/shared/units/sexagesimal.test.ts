import { describe, expect, it } from 'vitest'
import { formatDeclination, formatRightAscension } from '../../../../shared/units/sexagesimal'

describe('hours, degrees, minutes and seconds', () => {
  it('are written with leading zeros and a sign for the declination', () => {
    expect(formatRightAscension(41.708625)).toBe('02 46 50.07')
    expect(formatDeclination(15.2159722)).toBe('+15 12 57.5')
    expect(formatDeclination(-0.2159722)).toBe('−00 12 57.5')
    expect(formatDeclination(0, 0)).toBe('+00 00 00')
  })

  it('never show a 60, and no 24 hours', () => {
    expect(formatRightAscension(14.99999999)).toBe('01 00 00.00')
    expect(formatRightAscension(359.9999999)).toBe('00 00 00.00')
    expect(formatDeclination(29.99999999)).toBe('+30 00 00.0')
  })
})
