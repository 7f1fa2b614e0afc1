import * as rules from './number-rules'
import type { ParsedRelativeRow } from './parsed-row'
import { readEpoch } from './read-epoch'
import { readRelativePosition } from './read-relative-position'
import type { RowReader } from './row-reader'
import { VALUE_SENTENCES } from './sentences'

const NAMED_FRAMES = ['of_date', 'ICRS', 'J2000', 'B1950'] as const
const QUADRANTS = ['stated', 'ambiguous'] as const
/** The largest single mirrors have about 40 m in plan; 200 for 200 mm is the usual slip. */
const LARGEST_APERTURE_M = 50
const BRIGHTEST_MAG = -30
const FAINTEST_MAG = 40

/** Reads one row of a pair's measures; null where something in it is wrong, which then stands in the row's problems. */
export function readRelativeRow(row: RowReader, nowYr?: number): ParsedRelativeRow | null {
  const magnitude = rules.within(BRIGHTEST_MAG, FAINTEST_MAG, 'mag')
  const epochYr = readEpoch(row, nowYr)
  const position = readRelativePosition(row)
  const rest = {
    nights: row.number('nights', rules.nights),
    thetaFrame: readFrame(row),
    quadrant: row.word('quadrant', QUADRANTS),
    components: row.text('components'),
    magA: row.number('mag_a', magnitude),
    magB: row.number('mag_b', magnitude),
    deltaMag: row.number('delta_mag', magnitude),
    band: row.text('band'),
    method: row.text('method'),
    apertureM: row.number('aperture_m', value => rules.positive(value) ?? rules.within(0, LARGEST_APERTURE_M, 'm')(value)),
    stationText: row.text('station'),
    sourceText: row.text('source'),
    targetName: row.text('target'),
    observerName: row.text('observer'),
    remarks: row.text('remarks'),
  }
  if (row.problems.hasErrors || epochYr === null || position === null) return null
  return { kind: 'relative', epochYr, ...position, ...rest }
}

/** A frame by name in its usual spelling, or the year of an equinox as written. */
function readFrame(row: RowReader): string | null {
  const written = row.written('theta_frame')
  if (written === '') return null
  const named = NAMED_FRAMES.find(frame => frame.toLowerCase() === written.toLowerCase().replace(/\s+/g, '_'))
  if (named) return named
  if (/^(?:1[6-9]\d{2}|2[0-4]\d{2})(?:\.\d+)?$/.test(written)) return written
  row.complain('theta_frame', VALUE_SENTENCES.unknownFrame())
  return null
}
