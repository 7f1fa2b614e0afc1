import { followTarget } from '../../../server/services/targets/follow-target'
import type { TargetView } from '../../../shared/schemas/targets'
import type { FakeClock } from '../fake-clock'
import { cometFile } from '../simulated-comet'
import type { CometSeason, TrueComet } from '../simulated-comet'
import { addTarget, latestFit, publish, rule, runJobs, uploadAndSend } from '../work'
import type { DemoCast } from './cast'

/** Seen before its perihelion at the end of April 2026; whether it is bound is not settled by six weeks of it. */
export const TRUE_ILMENAU_4: TrueComet = {
  perihelionDistanceAu: 0.8841, eccentricity: 0.9999, inclinationDeg: 64.2, nodeDeg: 92.4, argumentOfPerihelionDeg: 88.7,
  perihelionTimeJdTt: 2461158.31, epochJdTt: 2461070.5,
}

const WINTER_HILL = { station: 'Winter Hill', site: { longitudeEastDeg: -2.52, latitudeDeg: 53.63, heightM: 500 }, sigmaArcsec: 0.6 }
const FENWICK_COURT = { station: 'Fenwick Court', site: { longitudeEastDeg: 10.91, latitudeDeg: 50.69, heightM: 500 }, sigmaArcsec: 0.4 }

/** 2026 January 15, in the evening. */
const FIRST_EVENING_JD = 2461056.29
const SEASONS = {
  orrowin: { ...WINTER_HILL, fromJdUtc: FIRST_EVENING_JD, nights: 7, stepDays: 4.6, exposuresANight: 3, seed: 51 },
  ilka: { ...FENWICK_COURT, fromJdUtc: FIRST_EVENING_JD + 2, nights: 6, stepDays: 4.9, exposuresANight: 3, seed: 52 },
  late: { ...FENWICK_COURT, fromJdUtc: FIRST_EVENING_JD + 32, nights: 3, stepDays: 4.4, exposuresANight: 3, seed: 53 },
} satisfies Record<string, CometSeason>

/** Four weeks of a comet are published, honest over their arc; two weeks more wait on the desk, fitted with the planets. */
export async function tellIlmenau4({ people, comets }: DemoCast, clock: FakeClock): Promise<TargetView> {
  clock.set('2026-01-15T10:00:00.000Z')
  const target = await addTarget(people.sefa.ctx, {
    programmeId: comets.id, kind: 'equatorial', name: 'Comet Ilmenau 4', aliases: ['ILM 4'],
    remarks: 'Diffuse, with a short tail toward the east; measure the brightest point of the inner coma.',
  })
  await followTarget(people.ossian.ctx, target.id)
  clock.set('2026-02-12T22:40:00.000Z')
  await uploadAndSend(people.orrowin.ctx, { text: cometFile(TRUE_ILMENAU_4, SEASONS.orrowin), fileName: 'ilmenau-4-orrowin.csv', target })
  clock.set('2026-02-13T11:05:00.000Z')
  await uploadAndSend(people.ilka.ctx, { text: cometFile(TRUE_ILMENAU_4, SEASONS.ilka), fileName: 'ilmenau-4-soundraven.csv', target })
  await runJobs(people.ilka.ctx)
  clock.set('2026-02-14T18:30:00.000Z')
  const accepted = await rule(people.sefa.ctx, await latestFit(people.sefa.ctx, target.id), 'accept', 'Both stations scatter about zero in both coordinates; the arc is short enough for the Sun alone.')
  clock.set('2026-02-15T09:10:00.000Z')
  await publish(people.sefa.ctx, accepted, 'First orbit, from thirty-nine measures over four weeks. Whether the comet is bound is not settled.')
  clock.set('2026-02-26T23:15:00.000Z')
  await uploadAndSend(people.ilka.ctx, { text: cometFile(TRUE_ILMENAU_4, SEASONS.late), fileName: 'ilmenau-4-late-february.csv', target })
  await runJobs(people.ilka.ctx)
  return target
}
