import fc from 'fast-check'
import Papa from 'papaparse'
import { describe, expect, it } from 'vitest'
import { writeCsv } from '../../../../shared/csv/write-csv'

const columns = [
  { name: 'dec_deg', cell: (row: { number: number | null; text: string }) => row.number },
  { name: 'remarks', cell: (row: { number: number | null; text: string }) => row.text },
]

describe('writeCsv', () => {
  it('writes negative numbers as numbers and text that looks like a formula as text', () => {
    expect(writeCsv(columns, [{ number: -0.25, text: '=SUM(A1)' }, { number: null, text: '-5 seeing' }]))
      .toBe('dec_deg,remarks\r\n-0.25,\'=SUM(A1)\r\n,\'-5 seeing\r\n')
  })

  it('gives every finite number back to the last bit', () => {
    fc.assert(fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), number => {
      const read = Papa.parse<string[]>(writeCsv(columns, [{ number, text: 'x' }]), { skipEmptyLines: true }).data
      expect(Object.is(Number(read[1]![0]), number)).toBe(true)
    }), { seed: 20261201 })
  })

  it('gives text with quotes, commas and line breaks back as it was', () => {
    fc.assert(fc.property(fc.string().filter(text => !/^[=+\-@\t\r\n]/.test(text)), text => {
      const read = Papa.parse<string[]>(writeCsv(columns, [{ number: 1, text }]), { newline: '\r\n' }).data
      expect(read[1]![1]).toBe(text)
    }), { seed: 20261201 })
  })

  it('never lets a text cell begin with a sign that a spreadsheet computes with', () => {
    fc.assert(fc.property(fc.constantFrom('=', '+', '-', '@', '\t', '\r'), fc.string(), (sign, rest) => {
      const read = Papa.parse<string[]>(writeCsv(columns, [{ number: 1, text: sign + rest }]), { newline: '\r\n' }).data
      expect(read[1]![1]![0]).toBe('\'')
    }), { seed: 20261201 })
  })

  it('refuses a number that is not finite', () => {
    expect(() => writeCsv(columns, [{ number: NaN, text: '' }])).toThrow(RangeError)
  })
})
