import { createTurns } from '../../shared/turns/turns'

/** A page of wide rows takes a few milliseconds. */
const ROWS_A_PAGE = 250

/** Reads a long list page by page, each from behind the last row of the one before, and lets others be answered in between. */
export async function readInPages<Row, Key>(readPage: (page: { after: Key | null; limit: number }) => Promise<Row[]>, keyOf: (row: Row) => Key): Promise<Row[]> {
  const turns = createTurns()
  const rows: Row[] = []
  for (let after: Key | null = null; ;) {
    const page = await readPage({ after, limit: ROWS_A_PAGE })
    for (const row of page) rows.push(row)
    if (page.length < ROWS_A_PAGE) return rows
    after = keyOf(page.at(-1)!)
    if (turns.isOver()) await turns.giveWay()
  }
}

/** Does a piece of work for a long list of ids or keys, a part of them at a time. */
export async function inParts<Item, Answer>(items: readonly Item[], work: (part: readonly Item[]) => Promise<readonly Answer[]>): Promise<Answer[]> {
  const turns = createTurns()
  const answers: Answer[] = []
  for (let start = 0; start < items.length; start += ROWS_A_PAGE) {
    for (const answer of await work(items.slice(start, start + ROWS_A_PAGE))) answers.push(answer)
    if (turns.isOver()) await turns.giveWay()
  }
  return answers
}
