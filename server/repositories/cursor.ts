import { inputInvalid } from '../errors/app-error'

/** How many items a list answers where the caller does not say. */
export const DEFAULT_LIMIT = 50

export interface PageQuery {
  cursor?: string | undefined
  limit?: number | undefined
}

interface PartTypes {
  string: string
  number: number
}
type Parts<Kinds extends readonly (keyof PartTypes)[]> = { -readonly [Index in keyof Kinds]: PartTypes[Kinds[Index]] }

/** A cursor is the sort key of the last item answered, opaque to clients. */
export function encodeCursor(key: readonly (string | number)[]): string {
  return Buffer.from(JSON.stringify(key)).toString('base64url')
}

/** The sort key in a cursor, its parts of these types. Throws input-invalid for a text that this list never gave out. */
export function decodeCursor<const Kinds extends readonly (keyof PartTypes)[]>(cursor: string, kinds: Kinds): Parts<Kinds> {
  const key = parse(cursor)
  if (!Array.isArray(key) || key.length !== kinds.length || !key.every((part, index) => typeof part === kinds[index])) {
    throw inputInvalid([{ path: 'cursor', reason: 'is not one that this list gave out; begin again without it' }])
  }
  return key as Parts<Kinds>
}

function parse(cursor: string): unknown {
  try {
    return JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8'))
  }
  catch {
    return null // refused by decodeCursor like any other text that is no cursor
  }
}

/** Cuts a page out of `limit + 1` rows: where the extra row came, there is more. */
export function pageOf<Row, Item>(rows: Row[], limit: number, { keyOf, itemOf }: { keyOf: (row: Row) => (string | number)[], itemOf: (row: Row) => Item }): { items: Item[], nextCursor: string | null } {
  const shown = rows.slice(0, limit)
  const last = shown.at(-1)
  return { items: shown.map(itemOf), nextCursor: rows.length > limit && last ? encodeCursor(keyOf(last)) : null }
}
