import { randomStream } from '../../../fitting/random'
import { followTarget } from '../../../server/services/targets/follow-target'
import type { TargetView } from '../../../shared/schemas/targets'
import type { FakeClock } from '../fake-clock'
import { tableText } from '../measure-files'
import { eccentricAnomalyRad, trueRadius, withinTurn } from '../simulated-measures'
import type { TruePlane } from '../simulated-measures'
import { addTarget, latestFit, publish, rule, runJobs, uploadAndSend } from '../work'
import type { DemoCast } from './cast'

export const TRUE_EARTH: TruePlane = { semiLatusRectum: 0.99972, eccentricity: 0.0167, periapsisDirectionDeg: 103 }
/** The Sun's diameter seen from 1 au, arcmin. */
const DIAMETER_AT_1_AU_ARCMIN = 31.988
const PERIHELION_MS = Date.parse('2025-01-04T13:28:00.000Z')
const YEAR_MS = 365.2596 * 86_400_000
const SIGMA_ARCMIN = 0.12

/** A year of solar diameters by two observers, accepted and published. */
export async function tellEarth({ people, sun }: DemoCast, clock: FakeClock): Promise<TargetView> {
  clock.set('2026-01-03T11:00:00.000Z')
  const target = await addTarget(people.sefa.ctx, {
    programmeId: sun.id, kind: 'plane', name: 'Earth about the Sun', radiusUnit: 'au', diameterScaleArcmin: DIAMETER_AT_1_AU_ARCMIN, caution: 'sun',
    remarks: 'Apparent diameters of the Sun, one full-aperture filter for all; r = 31.988′ / diameter in au.',
  })
  await followTarget(people.wenna.ctx, target.id)
  clock.set('2026-01-06T16:20:00.000Z')
  await uploadAndSend(people.ilka.ctx, { text: diameters({ count: 26, firstDay: 3, stepDays: 13.7, seed: 41 }), fileName: 'sun-2025-soundraven.csv', target })
  clock.set('2026-01-07T12:02:00.000Z')
  await uploadAndSend(people.orrowin.ctx, { text: diameters({ count: 23, firstDay: 9, stepDays: 15.1, seed: 42 }), fileName: 'sun-2025-orrowin.csv', target })
  await runJobs(people.orrowin.ctx)
  clock.set('2026-01-10T19:15:00.000Z')
  const accepted = await rule(people.sefa.ctx, await latestFit(people.sefa.ctx, target.id), 'accept', 'Both observers agree through the whole year.')
  clock.set('2026-01-11T09:00:00.000Z')
  await publish(people.sefa.ctx, accepted, 'First edition, from the diameters of 2025.')
  return target
}

interface Season {
  count: number
  firstDay: number
  stepDays: number
  seed: number
}

function diameters({ count, firstDay, stepDays, seed }: Season): string {
  const random = randomStream(seed)
  return tableText(Array.from({ length: count }, (_, k) => {
    const day = Math.floor(firstDay + stepDays * k + 3 * random.uniform())
    const timeMs = Date.parse('2025-01-01T11:30:00.000Z') + day * 86_400_000 + Math.floor(90 * random.uniform()) * 60_000
    const phiDeg = earthDirectionDeg(timeMs)
    const diameterArcmin = DIAMETER_AT_1_AU_ARCMIN / trueRadius(TRUE_EARTH, phiDeg) + SIGMA_ARCMIN * random.normal()
    return {
      time_utc: new Date(timeMs).toISOString().slice(0, 16) + 'Z',
      phi_deg: phiDeg.toFixed(2),
      diameter_arcmin: diameterArcmin.toFixed(3),
      sigma_diameter_arcmin: String(SIGMA_ARCMIN),
    }
  }))
}

function earthDirectionDeg(timeMs: number): number {
  const e = TRUE_EARTH.eccentricity
  const halfRad = eccentricAnomalyRad(2 * Math.PI * (timeMs - PERIHELION_MS) / YEAR_MS, e) / 2
  const trueRad = 2 * Math.atan2(Math.sqrt(1 + e) * Math.sin(halfRad), Math.sqrt(1 - e) * Math.cos(halfRad))
  return withinTurn(trueRad * 180 / Math.PI + TRUE_EARTH.periapsisDirectionDeg)
}
