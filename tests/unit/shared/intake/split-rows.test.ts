import fc from 'fast-check'
import Papa from 'papaparse'
import { describe, expect, it } from 'vitest'
import { splitRows } from '../../../../shared/intake/read-table'
import { runAtOnce } from '../../../../shared/turns/turns'

const split = (text: string, pieceCharacters?: number) => runAtOnce(splitRows(text, ',', pieceCharacters))

/** The whole text in one go, as a piece of any length must come to as well. */
function splitWhole(text: string): ReturnType<typeof split> {
  const { data, errors } = Papa.parse<string[]>(text, { delimiter: ',', newline: '\n' })
  const quoteError = errors.find(error => error.type === 'Quotes')
  return quoteError ? { ok: false, row: quoteError.row ?? 0 } : { ok: true, rows: data }
}

describe('a text split into rows piece by piece', () => {
  it('gives the rows of the whole, wherever it is cut', () => {
    const part = fc.constantFrom('1', '62.40', 'Linden', ' ', ',', ',', '\n', '\n', '"', '""', '"a,b"', '"two\nlines"', '"say ""so"""', '"kept" ')
    const text = fc.array(part, { minLength: 1, maxLength: 60 }).map(parts => `epoch,rho\n${parts.join('')}`)
    fc.assert(fc.property(text, fc.integer({ min: 1, max: 40 }), (whole, pieceCharacters) => {
      expect(split(whole, pieceCharacters)).toEqual(splitWhole(whole))
    }), { seed: 20261201, numRuns: 3000 })
  })

  it('keeps a cell whole that is longer than a piece', () => {
    const remark = 'seen twice,\n'.repeat(400)
    expect(split(`a,b\n1,"${remark}"\n2,x`, 64)).toEqual({ ok: true, rows: [['a', 'b'], ['1', remark], ['2', 'x']] })
  })

  it('counts rows over all pieces to the one whose quotation marks are wrong', () => {
    const good = '1,2\n'.repeat(500)
    expect(split(`${good}3,"4"x\n${good}`, 64)).toEqual({ ok: false, row: 500 })
    expect(split(`${good}3,"4\n${good}`, 64)).toEqual({ ok: false, row: 500 })
  })
})
