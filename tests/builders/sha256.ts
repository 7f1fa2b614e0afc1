/**
 * SHA-256 of a text in UTF-8, synchronous and in plain integers, so that Node and a page of any origin compute it alike
 * (a browser's own digest needs a secure context).
 * Source: FIPS 180-4, Secure Hash Standard (2015), 6.2.
 */
const BLOCK = 64

function firstBitsOfRoots(): { constants: Int32Array; initial: Int32Array } {
  const primes: number[] = []
  for (let n = 2; primes.length < 64; n++) if (primes.every((prime) => n % prime !== 0)) primes.push(n)
  return { constants: Int32Array.from(primes, (prime) => rootFraction(prime, 3n)), initial: Int32Array.from(primes.slice(0, 8), (prime) => rootFraction(prime, 2n)) }
}

/** First 32 bits of the fraction of the square or cube root, exact by whole numbers. */
function rootFraction(prime: number, degree: bigint): number {
  const target = BigInt(prime) << (32n * degree)
  let low = 0n
  let high = 1n << 40n
  while (high - low > 1n) {
    const middle = (low + high) / 2n
    const power = degree === 2n ? middle * middle : middle * middle * middle
    if (power <= target) low = middle
    else high = middle
  }
  return Number(BigInt.asIntN(32, low))
}

const { constants, initial } = firstBitsOfRoots()

function padded(bytes: Uint8Array): DataView {
  const length = Math.ceil((bytes.length + 9) / BLOCK) * BLOCK
  const out = new Uint8Array(length)
  out.set(bytes)
  out[bytes.length] = 0x80
  const view = new DataView(out.buffer)
  view.setUint32(length - 8, Math.floor(bytes.length / 0x20000000))
  view.setUint32(length - 4, (bytes.length << 3) >>> 0)
  return view
}

const turn = (x: number, by: number) => (x >>> by) | (x << (32 - by))

function compress(state: Int32Array, view: DataView, offset: number, words: Int32Array): void {
  for (let t = 0; t < 16; t++) words[t] = view.getInt32(offset + 4 * t)
  for (let t = 16; t < 64; t++) {
    const a = words[t - 15]!
    const b = words[t - 2]!
    words[t] = (words[t - 16]! + (turn(a, 7) ^ turn(a, 18) ^ (a >>> 3)) + words[t - 7]! + (turn(b, 17) ^ turn(b, 19) ^ (b >>> 10))) | 0
  }
  let [a, b, c, d, e, f, g, h] = state as unknown as [number, number, number, number, number, number, number, number]
  for (let t = 0; t < 64; t++) {
    const first = (h + (turn(e, 6) ^ turn(e, 11) ^ turn(e, 25)) + ((e & f) ^ (~e & g)) + constants[t]! + words[t]!) | 0
    const second = ((turn(a, 2) ^ turn(a, 13) ^ turn(a, 22)) + ((a & b) ^ (a & c) ^ (b & c))) | 0
    h = g
    g = f
    f = e
    e = (d + first) | 0
    d = c
    c = b
    b = a
    a = (first + second) | 0
  }
  for (const [i, value] of [a, b, c, d, e, f, g, h].entries()) state[i] = (state[i]! + value) | 0
}

export function sha256Hex(text: string): string {
  const view = padded(new TextEncoder().encode(text))
  const state = Int32Array.from(initial)
  const words = new Int32Array(64)
  for (let offset = 0; offset < view.byteLength; offset += BLOCK) compress(state, view, offset, words)
  return Array.from(state, (word) => (word >>> 0).toString(16).padStart(8, '0')).join('')
}
