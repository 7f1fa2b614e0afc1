/** What the benchmark's sections share: the row of the table, medians, processor time. */

/** One figure to reach, and what was measured. */
export interface Row {
  what: string
  reach: string
  measured: string
  /** null where the row is not served or not measured here. */
  met: boolean | null
}

export interface Options {
  systems: number
  seed: number
  hasScipy: boolean
}

export type Section = (options: Options) => Row[]

/** A row without a figure. */
export function notServed(what: string, reach: string, why = 'not served yet'): Row {
  return { what, reach, measured: why, met: null }
}

/** Quantile of values, 0 ≤ part < 1. */
export function quantile(values: readonly number[], part: number): number {
  return [...values].sort((a, b) => a - b)[Math.min(values.length - 1, Math.floor(values.length * part))] ?? NaN
}

export const median = (values: readonly number[]) => quantile(values, 0.5)

/** Processor time of a piece of work, ms: other work on the machine disturbs it less than the clock. */
export function timed<T>(work: () => T): { value: T; ms: number } {
  const before = process.cpuUsage()
  const value = work()
  const { user, system } = process.cpuUsage(before)
  return { value, ms: (user + system) / 1000 }
}

export const percent = (part: number, whole: number) => `${((100 * part) / whole).toFixed(1)} %`

/** Prints rows as they come. */
export function print(rows: readonly Row[]): void {
  for (const { what, reach, measured, met } of rows) {
    console.log(`${met === null ? ' – ' : met ? 'yes' : 'NO '}  ${what}\n       reach     ${reach}\n       measured  ${measured}`)
  }
}
