import { nameKey } from '../../shared/intake/name-key'
import type { MeasureRow } from '../../shared/intake/read-measures'
import type { CellProblem } from '../../shared/schemas/batches'
import { argumentProblem } from './argument-problem'

export type ChosenRows = { ok: true, rows: MeasureRow[] } | { ok: false, problems: CellProblem[] }

const UNNAMED = '(no name)'

/** The rows of one target: the one that was named, or the only one there is. A target's name may be given with its components, "Linden 12 AB". */
export function chooseTarget(rows: MeasureRow[], wanted: string | null): ChosenRows {
  const candidates = wanted === null ? rows : rows.filter(row => namesOf(row).includes(nameKey(wanted)))
  const found = labels(rows).join(', ')
  if (candidates.length === 0) return refuse(`No row is of the target "${wanted}". Found: ${found}.`, 'Give one of these names.')
  const chosen = labels(candidates)
  if (chosen.length > 1) return refuse(`The file holds more than one target: ${chosen.join(', ')}.`, 'Choose one: --target NAME.')
  return { ok: true, rows: candidates }
}

function refuse(reason: string, remedy: string): ChosenRows {
  return { ok: false, problems: [argumentProblem(reason, remedy)] }
}

const text = (row: MeasureRow, column: 'target' | 'components') => (row.cells[column] ?? '').trim()

/** Under which names a row may be asked for. */
function namesOf(row: MeasureRow): string[] {
  return [nameKey(text(row, 'target')), nameKey(`${text(row, 'target')} ${text(row, 'components')}`)]
}

/** The distinct targets by name and components; rows that leave the components out belong to the others of their name. */
function labels(rows: MeasureRow[]): string[] {
  const componentsByTarget = new Map<string, { target: string, components: Map<string, string> }>()
  for (const row of rows) {
    const target = text(row, 'target')
    const entry = componentsByTarget.get(nameKey(target)) ?? { target, components: new Map<string, string>() }
    const components = text(row, 'components')
    if (components !== '') entry.components.set(nameKey(components), components)
    componentsByTarget.set(nameKey(target), entry)
  }
  return [...componentsByTarget.values()].flatMap(({ target, components }) => {
    const name = target || UNNAMED
    return components.size > 1 ? [...components.values()].map(pair => `${name} ${pair}`) : [name]
  })
}
