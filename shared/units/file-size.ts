import { formatNumber } from './number-text'

const STEP = 1000
const UNITS = ['kB', 'MB', 'GB'] as const

/**
 * Writes the size of a file in decimal units.
 * @param byteCount bytes, whole, ≥ 0
 * @returns such as "812 bytes", "1 byte", "2.4 kB", "31 MB"
 */
export function formatFileSize(byteCount: number): string {
  if (byteCount < STEP) return `${byteCount} ${byteCount === 1 ? 'byte' : 'bytes'}`
  let size = byteCount / STEP
  let unit = 0
  while (size >= STEP && unit < UNITS.length - 1) {
    size /= STEP
    unit++
  }
  return `${formatNumber(size, size < 10 ? 1 : 0)} ${UNITS[unit]}`
}
