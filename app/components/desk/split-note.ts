/** Splits what stands out into its first clause, which a page can stress, and the rest. */
export function splitNote(note: string): { first: string, rest: string } {
  const end = note.search(/[:;]|[.] /)
  return end === -1 ? { first: note, rest: '' } : { first: note.slice(0, end), rest: note.slice(end) }
}
