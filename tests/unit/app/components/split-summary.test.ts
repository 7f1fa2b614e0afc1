import { describe, expect, it } from 'vitest'
import { splitSummary } from '../../../../app/components/orbit/split-summary'

const looks = (line: string) => splitSummary(line).map(piece => `${piece.look}:${piece.text}`)

describe('an orbit in one line', () => {
  it('symbols and their values are told apart, and nothing is lost', () => {
    const line = 'P 62.41 ± 0.38 yr, e 0.482, a 0.861″'
    expect(looks(line)).toEqual(['symbol:P', 'text: ', 'value:62.41 ± 0.38 yr', 'text:, ', 'symbol:e', 'text: ', 'value:0.482', 'text:, ', 'symbol:a', 'text: ', 'value:0.861″'])
    expect(splitSummary(line).map(piece => piece.text).join('')).toBe(line)
  })

  it('a letter inside a word or before a word is no symbol', () => {
    expect(looks('Motion so far straight: a line toward 231°')).toEqual(['text:Motion so far straight: a line toward 231°'])
  })
})
