import { readNumber, type NumberStyle } from './read-number'
import type { Complaint, RowProblems } from './problems'
import type { MeasureColumn } from './columns'
import type { RowCells } from './parsed-row'
import { ROW_SENTENCES, VALUE_SENTENCES } from './sentences'

/** A rule that a number must keep, or null where it does. */
export type NumberRule = (value: number) => Complaint | null

const LONGEST_TEXT = 1000

/** Reads the cells of one row one after the other and writes down what is wrong with them. */
export class RowReader {
  constructor(private readonly cells: RowCells, readonly problems: RowProblems, private readonly style: NumberStyle) {}

  isFilled(column: MeasureColumn): boolean {
    return this.written(column) !== ''
  }

  /** The cell's text as it stands, without blanks around it; empty where there is none. */
  written(column: MeasureColumn): string {
    return (Object.hasOwn(this.cells, column) ? this.cells[column] ?? '' : '').trim()
  }

  text(column: MeasureColumn): string | null {
    const written = this.written(column)
    if (written.length <= LONGEST_TEXT) return written === '' ? null : written
    this.complain(column, ROW_SENTENCES.textTooLong(LONGEST_TEXT))
    return null
  }

  /** The number in a cell; null where the cell is empty, or wrong and complained of. */
  number(column: MeasureColumn, rule?: NumberRule, written = this.written(column)): number | null {
    if (written === '') return null
    const read = readNumber(written, this.style)
    const complaint = read.ok ? rule?.(read.value) ?? null : read.complaint
    if (complaint) this.complain(column, complaint)
    return read.ok && !complaint ? read.value : null
  }

  /** One of a few words, upper and lower case alike. */
  word<Word extends string>(column: MeasureColumn, words: readonly Word[]): Word | null {
    const written = this.written(column)
    if (written === '') return null
    const found = words.find(word => word.toLowerCase() === written.toLowerCase())
    if (!found) this.complain(column, VALUE_SENTENCES.unknownWord(words))
    return found ?? null
  }

  complain(column: MeasureColumn, complaint: Complaint): void {
    this.problems.error(column, this.written(column), complaint)
  }

  note(column: MeasureColumn, complaint: Complaint): void {
    this.problems.note(column, this.written(column), complaint)
  }
}
