/**
 * Median of finite numbers.
 * @param values any finite numbers, in any order.
 * @returns the middle value, or the mean of the two middle ones; NaN for none.
 */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  const middle = Math.floor(sorted.length / 2)
  if (sorted.length === 0) return NaN
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2
}
