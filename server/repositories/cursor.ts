import { AppError } from '../errors/app-error'

/** How many items a list answers where the caller does not say. */
export const DEFAULT_LIMIT = 50

/** A cursor is the sort key of the last item answered, opaque to clients. */
export function encodeCursor(key: readonly (string | number)[]): string {
  return Buffer.from(JSON.stringify(key)).toString('base64url')
}

/** Throws input-invalid where the text is no cursor of `length` parts. */
export function decodeCursor(cursor: string, length: number): (string | number)[] {
  try {
    const key: unknown = JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8'))
    if (Array.isArray(key) && key.length === length && key.every(part => typeof part === 'string' || typeof part === 'number')) return key
  }
  catch {
    // answered below, like any other text that is no cursor
  }
  throw new AppError('input-invalid', 'The cursor is not one that this list gave out. Begin again without a cursor.', { fields: [{ path: 'cursor', reason: 'is not one that this list gave out' }] })
}

/** Cuts a page out of `limit + 1` rows: where the extra row came, there is more. */
export function pageOf<Row, Item>(rows: Row[], limit: number, { keyOf, itemOf }: { keyOf: (row: Row) => (string | number)[], itemOf: (row: Row) => Item }): { items: Item[], nextCursor: string | null } {
  const shown = rows.slice(0, limit)
  const last = shown.at(-1)
  return { items: shown.map(itemOf), nextCursor: rows.length > limit && last ? encodeCursor(keyOf(last)) : null }
}
