/**
 * The form under which names are compared: compatibility characters unified, lower case, single spaces.
 * "ＬＩＮＤＥＮ  12 ab " and "Linden 12 AB" have one key.
 */
export function nameKey(text: string): string {
  return text.normalize('NFKC').toLowerCase().replace(/\s+/g, ' ').trim()
}
