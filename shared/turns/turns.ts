/**
 * Long work in short slices. One thread answers everybody, so whoever works through thousands of rows lets waiting requests
 * and events have their turn every few milliseconds.
 */

/** How long a piece of work keeps the thread at a time, milliseconds. */
const SLICE_MS = 8

export interface Turns {
  /** True once the slice is used up; then it is the others' turn. */
  isOver(): boolean
  /** Lets others have their turn; settles when it is one's own again. */
  giveWay(): Promise<void>
}

/** Begins a slice. */
export function createTurns(): Turns {
  let endMs = performance.now() + SLICE_MS
  return {
    isOver: () => performance.now() >= endMs,
    async giveWay() {
      await others()
      endMs = performance.now() + SLICE_MS
    },
  }
}

/** The same as `items.map(work)`, in slices. */
export async function mapInTurns<Item, Answer>(items: Iterable<Item>, work: (item: Item) => Answer): Promise<Answer[]> {
  const turns = createTurns()
  const answers: Answer[] = []
  for (const item of items) {
    answers.push(work(item))
    if (turns.isOver()) await turns.giveWay()
  }
  return answers
}

/** The same as `items.map(work)`, but each answer is made only when it is asked for, so that they need not all be there at once. */
export function* mapLazily<Item, Answer>(items: Iterable<Item>, work: (item: Item) => Answer): Generator<Answer, void, undefined> {
  for (const item of items) yield work(item)
}

/** Work that can pause at every `yield`, and what it comes to. */
export type Steps<Answer> = Generator<undefined, Answer, undefined>

/** Goes through the steps without a pause. */
export function runAtOnce<Answer>(steps: Steps<Answer>): Answer {
  let step = steps.next()
  while (!step.done) step = steps.next()
  return step.value
}

/** Goes through the steps in slices. */
export async function runInTurns<Answer>(steps: Steps<Answer>): Promise<Answer> {
  const turns = createTurns()
  let step = steps.next()
  while (!step.done) {
    if (turns.isOver()) await turns.giveWay()
    step = steps.next()
  }
  return step.value
}

/** Behind what waits already: input and output too where the engine offers that. */
function others(): Promise<void> {
  const { setImmediate } = globalThis as { setImmediate?: (run: () => void) => unknown }
  return new Promise(resolve => void (setImmediate ? setImmediate(resolve) : setTimeout(resolve, 0)))
}
