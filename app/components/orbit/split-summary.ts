export interface SummaryPiece {
  look: 'symbol' | 'value' | 'text'
  text: string
}

/** A symbol, a space, and the value it stands before, up to the next comma or semicolon that ends it. */
const SYMBOL_WITH_VALUE = /(?<![\p{L}\d])([PTeapqirωΩφθρ])(₀?) (?=[\d−+-])([^,;]+)/gu

/** Splits a line such as "P 62.41 ± 0.38 yr, e 0.482" so that a page can set symbols and values each in their own type. */
export function splitSummary(line: string): SummaryPiece[] {
  const pieces: SummaryPiece[] = []
  let reached = 0
  const add = (look: SummaryPiece['look'], text: string) => {
    if (text) pieces.push({ look, text })
  }
  for (const match of line.matchAll(SYMBOL_WITH_VALUE)) {
    add('text', line.slice(reached, match.index))
    add('symbol', `${match[1]}${match[2]}`)
    add('text', ' ')
    add('value', match[3]!)
    reached = match.index + match[0].length
  }
  add('text', line.slice(reached))
  return pieces
}
