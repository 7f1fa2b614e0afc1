import { describe, expect, it } from 'vitest'
import { BATCH_STEPS, countsSentence, currentStep, isOpenDraft, sendLabel } from '../../../../app/components/batch/batch-words'

describe('a batch in words', () => {
  it('counts that are zero are left out', () => {
    expect(countsSentence({ rows: 50, good: 43, bad: 3, alreadyHere: 4, sent: 0 })).toBe('50 rows · 43 ready to send · 3 to mend · 4 already here')
    expect(countsSentence({ rows: 1, good: 0, bad: 0, alreadyHere: 0, sent: 1 })).toBe('1 row · 1 sent')
  })

  it('the button says what it would send, and when that is nothing, why', () => {
    expect(sendLabel({ good: 43, alreadyHere: 4 })).toBe('Send 43 new measures')
    expect(sendLabel({ good: 1, alreadyHere: 0 })).toBe('Send 1 new measure')
    expect(sendLabel({ good: 0, alreadyHere: 50 })).toBe('0 new, 50 already here')
    expect(sendLabel({ good: 0, alreadyHere: 0 })).toBe('Nothing to send yet')
  })
})

describe('where a batch stands', () => {
  const step = (counts: { good: number, bad: number, sent: number }) => BATCH_STEPS[currentStep(counts)]

  it('is to be mended, then sent, then ruled on', () => {
    expect(step({ good: 43, bad: 3, sent: 0 })).toBe('Mend')
    expect(step({ good: 43, bad: 0, sent: 0 })).toBe('Send')
    expect(step({ good: 0, bad: 0, sent: 43 })).toBe('Ruling')
    expect(step({ good: 0, bad: 3, sent: 43 })).toBe('Mend')
  })

  it('a file in which nothing is new waits for no ruling, and its owner is told so', () => {
    expect(isOpenDraft({ good: 0, bad: 0, sent: 0 })).toBe(true)
    expect(step({ good: 0, bad: 0, sent: 0 })).toBe('Send')
  })
})
