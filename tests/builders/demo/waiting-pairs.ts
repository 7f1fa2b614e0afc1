import type { TargetView } from '../../../shared/schemas/targets'
import type { FakeClock } from '../fake-clock'
import { pairFile, tableText } from '../measure-files'
import { simulatePair, unevenEpochs } from '../simulated-measures'
import type { TruePair } from '../simulated-measures'
import { addTarget, runJobs, uploadAndSend } from '../work'
import type { DemoCast } from './cast'

export const TRUE_LINDEN_7: TruePair = {
  periodYr: 188, periastronTimeYr: 2006, eccentricity: 0.34, semiMajorAxisArcsec: 2.31, inclinationDeg: 61, nodeDeg: 34, argumentOfPeriastronDeg: 205,
}
const NOISE = { sigmaThetaDeg: 0.3, sigmaRhoArcsec: 0.01, seed: 71 }

/** Forty years of a long period: a fit that waits on the desk, and an arc too short for the programme's rules. */
export async function tellLinden7({ people, pairs }: DemoCast, clock: FakeClock): Promise<TargetView> {
  clock.set('2026-03-15T20:10:00.000Z')
  const target = await addTarget(people.sefa.ctx, { programmeId: pairs.id, kind: 'relative', name: 'Linden 7 AB', aliases: ['LND 7'], componentA: 'A', componentB: 'B' })
  const measures = simulatePair(TRUE_LINDEN_7, unevenEpochs({ from: 1984.3, count: 22, stepYr: 1.85, seed: 72 }), NOISE)
  clock.set('2026-03-16T21:25:00.000Z')
  await uploadAndSend(people.ossian.ctx, { text: pairFile(measures.slice(0, 12), { ...NOISE, observer: 'R. Quellmann', nights: 2 }), fileName: 'quellmann-linden-7.csv', target })
  await uploadAndSend(people.ossian.ctx, { text: pairFile(measures.slice(12), { ...NOISE, nights: 2 }), fileName: 'brandvik-linden-7.csv', target })
  await runJobs(people.ossian.ctx)
  return target
}

/** A first season with three readable rows, too few for an orbit, and three that wait in the draft to be mended. */
export async function tellHazel3({ people, pairs }: DemoCast, clock: FakeClock): Promise<TargetView> {
  clock.set('2026-03-18T19:00:00.000Z')
  const target = await addTarget(people.mirelle.ctx, { programmeId: pairs.id, kind: 'relative', name: 'Hazel 3 AB', componentA: 'A', componentB: 'B' })
  clock.set('2026-03-19T22:14:00.000Z')
  await uploadAndSend(people.ilka.ctx, { text: HAZEL_FILE, fileName: 'hazel-3-first-season.csv', target })
  await runJobs(people.ilka.ctx)
  return target
}

const HAZEL_FILE = tableText([
  { epoch: '2026.021', theta_deg: '231.4', rho_arcsec: '3.14', sigma_theta_deg: '0.6', sigma_rho_arcsec: '0.03', remarks: '' },
  { epoch: '2026.087', theta_deg: '361', rho_arcsec: '3.13', sigma_theta_deg: '0.6', sigma_rho_arcsec: '0.03', remarks: 'θ read twice' },
  { epoch: '2026.132', theta_deg: '231.9', rho_arcsec: '0', sigma_theta_deg: '0.6', sigma_rho_arcsec: '0.03', remarks: 'seeing 5″' },
  { epoch: '20260', theta_deg: '231.2', rho_arcsec: '3.16', sigma_theta_deg: '0.6', sigma_rho_arcsec: '0.03', remarks: '' },
  { epoch: '2026.171', theta_deg: '231.6', rho_arcsec: '3.12', sigma_theta_deg: '0.6', sigma_rho_arcsec: '0.03', remarks: '' },
  { epoch: '2026.204', theta_deg: '231.1', rho_arcsec: '3.15', sigma_theta_deg: '0.6', sigma_rho_arcsec: '0.03', remarks: '' },
])
