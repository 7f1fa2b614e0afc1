/**
 * Joins words as a sentence does.
 * @param words any number of them
 * @returns "a", "a and b", "a, b and c"; empty for none
 */
export function joinWords(words: readonly string[]): string {
  if (words.length < 2) return words[0] ?? ''
  return `${words.slice(0, -1).join(', ')} and ${words[words.length - 1]}`
}
