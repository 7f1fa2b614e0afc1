/** Distance of two doubles in units in the last place, by their order among all doubles. */
const cell = new Float64Array(1)
const bits = new BigInt64Array(cell.buffer)

function orderOf(x: number): bigint {
  cell[0] = x
  const order = bits[0]!
  return order < 0n ? -(order & 0x7FFFFFFFFFFFFFFFn) : order
}

export function ulpsApart(a: number, b: number): number {
  if (Object.is(a, b) || a === b) return 0
  if (Number.isNaN(a) || Number.isNaN(b)) return Infinity
  const distance = orderOf(a) - orderOf(b)
  return Number(distance < 0n ? -distance : distance)
}
