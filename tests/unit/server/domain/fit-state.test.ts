import { describe, expect, it } from 'vitest'
import { batchStateAfter, canBecome, fitStateAfter, isWaiting } from '../../../../server/domain/fit-state'
import { DECISIONS, FIT_STATES } from '../../../../shared/schemas/fits'

describe('a fit', () => {
  it('goes from queued to running to an outcome, is ruled on when done and published when accepted', () => {
    const steps = FIT_STATES.flatMap(from => FIT_STATES.filter(to => to !== 'superseded' && to !== from && canBecome(from, to)).map(to => `${from} → ${to}`))
    expect(steps).toEqual([
      'queued → running', 'queued → done', 'queued → failed', 'running → done', 'running → failed', 'done → accepted', 'done → declined', 'accepted → published',
    ])
  })

  it('can be superseded exactly while it waits', () => {
    expect(FIT_STATES.filter(state => canBecome(state, 'superseded'))).toEqual(FIT_STATES.filter(isWaiting))
    expect(FIT_STATES.filter(isWaiting)).toEqual(['queued', 'running', 'done', 'failed'])
  })

  it('becomes accepted or declined by a ruling, and stays failed where there is no result to decline', () => {
    expect(DECISIONS.map(decision => fitStateAfter(decision, 'done'))).toEqual(['accepted', 'declined', 'declined'])
    expect(DECISIONS.map(decision => fitStateAfter(decision, 'failed'))).toEqual([null, 'failed', 'failed'])
  })

  it('cannot be ruled on before it is finished or twice', () => {
    for (const state of ['queued', 'running', 'accepted', 'declined', 'superseded', 'published'] as const) {
      expect(DECISIONS.map(decision => fitStateAfter(decision, state))).toEqual([null, null, null])
    }
  })

  it('passes the ruling on to the parts of the batches it brought in', () => {
    expect(DECISIONS.map(batchStateAfter)).toEqual(['accepted', 'returned', 'declined'])
  })
})
