import { describe, expect, it } from 'vitest'
import { canBecome, isOpenToOthers, mayDiscard, maySend, mayWithdraw } from '../../../../server/domain/batch-state'
import { BATCH_STATES } from '../../../../shared/schemas/batches'

describe("a batch's part", () => {
  it('goes the way it may go and no other', () => {
    const steps = BATCH_STATES.flatMap(from => BATCH_STATES.filter(to => canBecome(from, to)).map(to => `${from} → ${to}`))
    expect(steps).toEqual([
      'draft → sent', 'sent → sent', 'sent → accepted', 'sent → returned', 'sent → declined', 'sent → withdrawn', 'accepted → sent', 'returned → draft',
    ])
  })

  it('can be sent as a draft, again with mended rows, and after it was returned, but not once it is declined or withdrawn', () => {
    expect(BATCH_STATES.filter(maySend)).toEqual(['draft', 'sent', 'accepted', 'returned'])
  })

  it('can be withdrawn only while nobody has ruled on it', () => {
    expect(BATCH_STATES.filter(mayWithdraw)).toEqual(['sent'])
  })

  it('keeps its batch from being thrown away once it left the draft', () => {
    expect(mayDiscard(['draft', 'draft'])).toBe(true)
    expect(mayDiscard([])).toBe(true)
    expect(mayDiscard(['draft', 'withdrawn'])).toBe(false)
  })

  it('opens its batch to others from the first sending on, whatever became of it', () => {
    expect(isOpenToOthers([{ sentAt: null }])).toBe(false)
    expect(isOpenToOthers([{ sentAt: null }, { sentAt: '2026-12-01T20:00:00.000Z' }])).toBe(true)
  })
})
