import type { Kind } from '../../fitting/types'

/** The canonical columns of a kind, in the order in which a template lists them; the meaning is shown to people. */
export interface ColumnMeaning {
  name: MeasureColumn
  meaning: string
  /** What a number is in; null for text. */
  unit: string | null
}

/** Exactly one of these gives the time of a `relative` measure. */
export const EPOCH_COLUMNS = ['epoch', 'jd', 'mjd', 'date'] as const
export type EpochColumn = (typeof EPOCH_COLUMNS)[number]

const RELATIVE_COLUMNS = [
  ['target', 'name of the pair', null],
  ['components', 'which components, such as AB', null],
  ['epoch', 'year; bare years count as Besselian before 1984.0 and as Julian from then on; prefix B or J decides', 'yr'],
  ['jd', 'Julian date', 'd'],
  ['mjd', 'modified Julian date', 'd'],
  ['date', 'date or time, ISO 8601 in UTC', null],
  ['theta_deg', 'position angle θ from north through east', 'deg'],
  ['rho_arcsec', 'separation ρ', 'arcsec'],
  ['sigma_theta_deg', 'standard error of θ', 'deg'],
  ['sigma_rho_arcsec', 'standard error of ρ', 'arcsec'],
  ['corr_theta_rho', 'correlation of θ and ρ', '1'],
  ['east_arcsec', 'offset toward east', 'arcsec'],
  ['north_arcsec', 'offset toward north', 'arcsec'],
  ['sigma_east_arcsec', 'standard error toward east', 'arcsec'],
  ['sigma_north_arcsec', 'standard error toward north', 'arcsec'],
  ['corr_east_north', 'correlation of east and north', '1'],
  ['rho_limit_arcsec', 'not resolved: closer than this', 'arcsec'],
  ['quadrant', 'stated or ambiguous', null],
  ['theta_frame', 'of_date, ICRS, J2000, B1950 or a year', null],
  ['nights', 'number of nights in the mean', '1'],
  ['observer', 'who measured', null],
  ['station', 'where', null],
  ['method', 'how', null],
  ['aperture_m', 'aperture of the telescope', 'm'],
  ['mag_a', 'magnitude of the first component', 'mag'],
  ['mag_b', 'magnitude of the second component', 'mag'],
  ['delta_mag', 'difference of the magnitudes', 'mag'],
  ['band', 'passband of the magnitudes', null],
  ['source', 'where it was published', null],
  ['remarks', 'anything else', null],
] as const

const PLANE_COLUMNS = [
  ['target', 'name of the body', null],
  ['time_utc', 'date or time, ISO 8601 in UTC', null],
  ['phi_deg', 'direction φ in the plane of the orbit', 'deg'],
  ['r', 'distance from the focus', "the target's unit"],
  ['sigma_r', 'standard error of r', "the target's unit"],
  ['diameter_arcmin', 'apparent diameter', 'arcmin'],
  ['sigma_diameter_arcmin', 'standard error of the diameter', 'arcmin'],
  ['observer', 'who measured', null],
  ['remarks', 'anything else', null],
] as const

const EQUATORIAL_COLUMNS = [
  ['target', 'name of the comet or minor planet', null],
  ['time_utc', 'middle of the exposure: ISO 8601 in UTC, or a date with a fraction of the day such as 2026-03-14.51234', null],
  ['ra_deg', 'right ascension, ICRS', 'deg'],
  ['ra_hms', 'the same as hours, minutes and seconds: 02 46 50.07', null],
  ['dec_deg', 'declination, ICRS', 'deg'],
  ['dec_dms', 'the same as degrees, minutes and seconds: −00 12 57.5', null],
  ['station', 'code or name of where it was measured', null],
  ['lon_deg', 'longitude of the station, east positive', 'deg'],
  ['lat_deg', 'latitude of the station, WGS 84', 'deg'],
  ['height_m', 'height of the station', 'm'],
  ['sigma_ra_cosdec_arcsec', 'standard error along right ascension, on the sky (times cos δ)', 'arcsec'],
  ['sigma_dec_arcsec', 'standard error of the declination', 'arcsec'],
  ['corr_ra_dec', 'correlation of the two', '1'],
  ['sigma_time_s', 'standard error of the time', 's'],
  ['star_catalogue', 'catalogue of the comparison stars', null],
  ['tracklet', 'a name that measures of one night and one motion share', null],
  ['mag', 'magnitude', 'mag'],
  ['band', 'passband of the magnitude', null],
  ['observer', 'who measured', null],
  ['remarks', 'anything else', null],
] as const

export type MeasureColumn =
  | (typeof RELATIVE_COLUMNS)[number][0] | (typeof PLANE_COLUMNS)[number][0] | (typeof EQUATORIAL_COLUMNS)[number][0]

const meanings = (rows: readonly (readonly [MeasureColumn, string, string | null])[]): ColumnMeaning[] =>
  rows.map(([name, meaning, unit]) => ({ name, meaning, unit }))

export const COLUMNS: Record<Kind, readonly ColumnMeaning[]> = {
  relative: meanings(RELATIVE_COLUMNS),
  equatorial: meanings(EQUATORIAL_COLUMNS),
  plane: meanings(PLANE_COLUMNS),
}

/** Columns of `equatorial` that no other kind has: they tell what a file is about. */
const EQUATORIAL_MARKS = ['ra_deg', 'ra_hms', 'dec_deg', 'dec_dms']

/** Upper case, hyphens and spaces in a heading do not matter: "Theta deg" is theta_deg. */
export function canonicalHeading(heading: string): string {
  return heading.trim().toLowerCase().replace(/[\s-]+/g, '_')
}

/** What a file is about, by its headings; `relative` where nothing says otherwise. */
export function guessKind(headings: readonly string[]): Kind {
  const names = headings.map(canonicalHeading)
  if (names.includes('phi_deg')) return 'plane'
  return names.some(name => EQUATORIAL_MARKS.includes(name)) ? 'equatorial' : 'relative'
}
