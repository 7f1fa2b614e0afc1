import { describe, expect, it } from 'vitest'
import { mapInTurns, mapLazily, runAtOnce, runInTurns } from '../../../../shared/turns/turns'
import type { Steps } from '../../../../shared/turns/turns'

const NUMBERS = Array.from({ length: 40 }, (_, i) => i)

/** Keeps the thread for about a millisecond. */
function workHard(number: number): number {
  const end = performance.now() + 1
  while (performance.now() < end) { /* as a parser would */ }
  return number * 2
}

function* workInSteps(): Steps<number[]> {
  const answers: number[] = []
  for (const number of NUMBERS) {
    answers.push(workHard(number))
    yield
  }
  return answers
}

/** What was done in which order, where something waits already when the work begins. */
async function orderOf(work: () => Promise<unknown>): Promise<string[]> {
  const order: string[] = []
  setImmediate(() => order.push('what waited'))
  await work()
  order.push('the work')
  return order
}

describe('long work', () => {
  it('comes to the same in slices and at once', async () => {
    const expected = NUMBERS.map(number => number * 2)
    expect(await mapInTurns(NUMBERS, workHard)).toEqual(expected)
    expect([...mapLazily(NUMBERS, workHard)]).toEqual(expected)
    expect(runAtOnce(workInSteps())).toEqual(expected)
    expect(await runInTurns(workInSteps())).toEqual(expected)
  })

  it('lets what waits be done before it ends', async () => {
    expect(await orderOf(() => mapInTurns(NUMBERS, workHard))).toEqual(['what waited', 'the work'])
    expect(await orderOf(() => runInTurns(workInSteps()))).toEqual(['what waited', 'the work'])
  })

  it('that is short ends without waiting for others', async () => {
    expect(await orderOf(() => mapInTurns([1, 2], number => number))).toEqual(['the work'])
  })

  it('fails as the piece that failed', async () => {
    const fail = () => { throw new RangeError('row 3 is no row') }
    await expect(mapInTurns(NUMBERS, fail)).rejects.toThrow('row 3 is no row')
  })

  it('makes what is asked for and no more', () => {
    const made: number[] = []
    const lazily = mapLazily(NUMBERS, number => made.push(number))
    lazily.next()
    lazily.next()
    expect(made).toEqual([0, 1])
  })
})
