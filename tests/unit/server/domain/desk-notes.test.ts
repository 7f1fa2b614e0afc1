import { describe, expect, it } from 'vitest'
import { deskNotes, deskSubject } from '../../../../server/domain/desk-notes'
import { pairResult } from '../../../builders/fit-result'

const NOTHING = { result: null, refusal: null, changeInSigma: null }

describe('what the desk says of a fit', () => {
  it('is nothing where nothing stands out', () => {
    expect(deskNotes({ ...NOTHING, result: pairResult(), changeInSigma: { period: 0.7, node: null } })).toEqual([])
  })

  it('names proposals, the two largest moves, alternatives and warnings, in words', () => {
    const result = pairResult({}, {
      proposals: [
        { measureId: 'a', action: 'set-aside', reason: 'far off' },
        { measureId: 'b', action: 'set-aside', reason: 'far off' },
        { measureId: 'c', action: 'change-quadrant', reason: 'turned' },
      ],
      alternatives: [{ deltaChiSquare: 3, elements: {} }],
      warnings: ['The arc is short.'],
    })
    expect(deskNotes({ ...NOTHING, result, changeInSigma: { period: -2.4, eccentricity: 2.1, semiMajorAxis: 3.3, node: 1.9 } })).toEqual([
      '2 measures proposed to be set aside',
      '1 quadrant may be exchanged',
      'Against the edition in force semi-major axis by 3.3 σ and period by 2.4 σ moved',
      'Another orbit fits nearly as well',
      'The arc is short.',
    ])
  })

  it('gives the reason and the remedy of a fit that could not be made', () => {
    const refusal = { code: 'too-few-measures' as const, sentence: 'There are 3 measures.', remedy: 'Send at least one more.' }
    expect(deskNotes({ ...NOTHING, refusal })).toEqual(['There are 3 measures. Send at least one more.'])
  })

  it('says whose new measures wait', () => {
    expect(deskSubject(9, ['T. Orrowin'])).toBe('9 new measures by T. Orrowin')
    expect(deskSubject(1, ['T. Orrowin', 'R. Quellmann'])).toBe('1 new measure by T. Orrowin and R. Quellmann')
    expect(deskSubject(12, ['A', 'B', 'C'])).toBe('12 new measures by 3 observers')
    expect(deskSubject(0, [])).toBe('Refit without new measures')
  })
})
