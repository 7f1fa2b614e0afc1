import { describe, expect, it } from 'vitest'
import { splitNote } from '../../../../app/components/desk/split-note'

describe('what stands out about a fit', () => {
  it.each([
    ['Another orbit fits as well: 188 yr or 241 yr', 'Another orbit fits as well', ': 188 yr or 241 yr'],
    ['P moved by 0.7 σ', 'P moved by 0.7 σ', ''],
    ['6 coordinates of 3 epochs are used. Use at least four.', '6 coordinates of 3 epochs are used', '. Use at least four.'],
  ])('%s is stressed in its first clause', (note, first, rest) => {
    expect(splitNote(note)).toEqual({ first, rest })
  })
})
