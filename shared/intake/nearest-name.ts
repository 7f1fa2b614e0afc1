/** Number of single-character changes, including swapped neighbours, that turn one word into the other. */
function editDistance(from: string, to: string): number {
  const rows: number[][] = [Array.from({ length: to.length + 1 }, (_, j) => j)]
  for (let i = 1; i <= from.length; i++) {
    const row = [i]
    for (let j = 1; j <= to.length; j++) {
      const replaced = rows[i - 1]![j - 1]! + (from[i - 1] === to[j - 1] ? 0 : 1)
      const isSwap = i > 1 && j > 1 && from[i - 1] === to[j - 2] && from[i - 2] === to[j - 1]
      const swapped = isSwap ? rows[i - 2]![j - 2]! + 1 : Infinity
      row.push(Math.min(replaced, swapped, rows[i - 1]![j]! + 1, row[j - 1]! + 1))
    }
    rows.push(row)
  }
  return rows[from.length]![to.length]!
}

const LONGEST_COMPARED = 60

/** The name a person most likely meant, or null where none is near: at most a third of the letters may differ, or one name begins the other. */
export function nearestName<Name extends string>(written: string, names: readonly Name[]): Name | null {
  if (written.length < 2 || written.length > LONGEST_COMPARED) return null
  const begins = names.filter(name => name.startsWith(`${written}_`) || written.startsWith(`${name}_`))
  if (begins.length > 0) return begins[0]!
  const ranked = names.map(name => ({ name, distance: editDistance(written, name) })).sort((a, b) => a.distance - b.distance)
  const best = ranked[0]
  return best && best.distance * 3 <= Math.max(written.length, best.name.length) ? best.name : null
}
