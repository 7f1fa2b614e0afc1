/** The signs under which people know the units that results name in words. */
const SYMBOLS: Record<string, string> = {
  'deg': '°',
  'arcmin': '′',
  'arcsec': '″',
  'Julian year': 'yr',
  'arcsec/yr': '″/yr',
  'deg/yr': '°/yr',
  '1': '',
}

/**
 * The sign of a unit.
 * @param unit the unit as results name it: "deg", "arcsec", "yr", "au" or a target's own
 * @returns such as "°", "″"; a unit that has no sign of its own is returned as it is
 */
export function unitSymbol(unit: string): string {
  return Object.hasOwn(SYMBOLS, unit) ? SYMBOLS[unit]! : unit
}
