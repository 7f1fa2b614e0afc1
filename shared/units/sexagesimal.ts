import { MINUS } from './number-text'

const FULL_TURN_DEG = 360
const DEG_AN_HOUR = 15

/** Whole units, minutes and seconds of an angle that was rounded first, so that no 60 is ever written. */
function parts(size: number, decimals: number): { units: number; minutes: number; seconds: string } {
  const scale = 10 ** decimals
  const rounded = Math.round(size * 3600 * scale)
  const seconds = (rounded % (60 * scale)) / scale
  const wholeMinutes = Math.floor(rounded / (60 * scale))
  return { units: Math.floor(wholeMinutes / 60), minutes: wholeMinutes % 60, seconds: seconds.toFixed(decimals).padStart(decimals > 0 ? decimals + 3 : 2, '0') }
}

const twoDigits = (value: number) => String(value).padStart(2, '0')

/**
 * Writes a right ascension in hours, minutes and seconds.
 * @param raDeg degrees, any turn
 * @param decimals of the second, 0 to 4, default 2
 * @returns such as "02 46 50.07", 00 to 23 hours
 */
export function formatRightAscension(raDeg: number, decimals = 2): string {
  const turned = raDeg - FULL_TURN_DEG * Math.floor(raDeg / FULL_TURN_DEG)
  const { units, minutes, seconds } = parts(turned / DEG_AN_HOUR, decimals)
  return `${twoDigits(units % 24)} ${twoDigits(minutes)} ${seconds}`
}

/**
 * Writes a declination in degrees, minutes and seconds, always with its sign.
 * @param decDeg degrees, −90 to 90
 * @param decimals of the second, 0 to 4, default 1
 * @returns such as "−00 12 57.5"
 */
export function formatDeclination(decDeg: number, decimals = 1): string {
  const { units, minutes, seconds } = parts(Math.abs(decDeg), decimals)
  return `${decDeg < 0 ? MINUS : '+'}${twoDigits(units)} ${twoDigits(minutes)} ${seconds}`
}
