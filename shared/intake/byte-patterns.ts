/** First bytes of files that are taken for tables, with what to call them. */
const SIGNATURES: readonly { format: string; bytes: readonly number[] }[] = [
  { format: 'a spreadsheet or another zipped file', bytes: [0x50, 0x4B, 0x03, 0x04] },
  { format: 'an old spreadsheet or document', bytes: [0xD0, 0xCF, 0x11, 0xE0] },
  { format: 'a PDF', bytes: [0x25, 0x50, 0x44, 0x46, 0x2D] },
  { format: 'a gzip archive', bytes: [0x1F, 0x8B] },
  { format: 'a picture', bytes: [0x89, 0x50, 0x4E, 0x47] },
  { format: 'a picture', bytes: [0xFF, 0xD8, 0xFF] },
  { format: 'a picture', bytes: [0x47, 0x49, 0x46, 0x38] },
  { format: 'a camera image in FITS format', bytes: [0x53, 0x49, 0x4D, 0x50, 0x4C, 0x45, 0x20, 0x20, 0x3D] },
]

export function knownBinary(bytes: Uint8Array): string | null {
  return SIGNATURES.find(signature => signature.bytes.every((byte, i) => bytes[i] === byte))?.format ?? null
}

const SAMPLE_BYTES = 4096
/** In UTF-16 text of Latin letters nearly every second byte is NUL; in anything else hardly any. */
const MOST = 0.4
const FEW = 0.05

/** UTF-16 without a byte order mark gives itself away by where its NUL bytes stand. */
export function nulPattern(bytes: Uint8Array): 'UTF-16LE' | 'UTF-16BE' | null {
  const sample = bytes.subarray(0, SAMPLE_BYTES)
  const pairs = Math.floor(sample.length / 2)
  if (pairs === 0 || bytes.length % 2 === 1) return null
  let even = 0
  let odd = 0
  for (let i = 0; i < pairs * 2; i += 2) {
    if (sample[i] === 0) even++
    if (sample[i + 1] === 0) odd++
  }
  if (odd >= pairs * MOST && even <= pairs * FEW) return 'UTF-16LE'
  if (even >= pairs * MOST && odd <= pairs * FEW) return 'UTF-16BE'
  return null
}

const TAB = 9
const LINE_FEED = 10
const FORM_FEED = 12
const CARRIAGE_RETURN = 13
const FIRST_PRINTABLE = 32
const ALLOWED = new Set([TAB, LINE_FEED, FORM_FEED, CARRIAGE_RETURN])

/** The first character that no text file has, as U+0000, or null. */
export function firstControlCode(text: string): string | null {
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i)
    if (code < FIRST_PRINTABLE && !ALLOWED.has(code)) return `U+${code.toString(16).toUpperCase().padStart(4, '0')}`
  }
  return null
}
