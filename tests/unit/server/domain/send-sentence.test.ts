import { describe, expect, it } from 'vitest'
import { nothingNewSentence, sendSentence } from '../../../../server/domain/send-sentence'

describe('what is said after sending', () => {
  it('counts what is new, what was here and what stays a draft', () => {
    expect(sendSentence({ sent: 12, alreadyHere: 0, keptAsDraft: 0 })).toBe('12 new measures sent.')
    expect(sendSentence({ sent: 1, alreadyHere: 1, keptAsDraft: 1 })).toBe('1 new measure sent. 1 was already here. 1 row is kept as a draft.')
    expect(sendSentence({ sent: 43, alreadyHere: 4, keptAsDraft: 3 })).toBe('43 new measures sent. 4 were already here. 3 rows are kept as a draft.')
  })

  it('says plainly that nothing was new', () => {
    expect(nothingNewSentence({ sent: 0, alreadyHere: 50, keptAsDraft: 0 })).toMatch(/^0 new, 50 already here\./)
    expect(nothingNewSentence({ sent: 0, alreadyHere: 0, keptAsDraft: 2 })).toMatch(/^0 new, 0 already here\. 2 rows cannot be sent as they stand/)
  })
})
