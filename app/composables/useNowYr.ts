const DAYS_PER_JULIAN_YEAR = 365.25
const MS_PER_DAY = 86_400_000
const J2000_UNIX_MS = Date.UTC(2000, 0, 1, 12)

/** Now as a Julian year, the same in the server's render and in the browser. */
export function useNowYr() {
  return useState('now-yr', () => 2000 + (Date.now() - J2000_UNIX_MS) / MS_PER_DAY / DAYS_PER_JULIAN_YEAR)
}
