import type { Context } from '../../server/context/context'
import type { FitView } from '../../shared/schemas/fits'
import type { TargetView } from '../../shared/schemas/targets'
import { pairFile } from './measure-files'
import { addPerson, addProgramme } from './people'
import type { AddedPerson } from './people'
import { simulatePair, unevenEpochs } from './simulated-measures'
import type { TruePair } from './simulated-measures'
import { addTarget, latestFit, rule, runJobs, uploadAndSend } from './work'

export const TRUE_PAIR: TruePair = {
  periodYr: 62.4, periastronTimeYr: 2009.3, eccentricity: 0.482, semiMajorAxisArcsec: 0.861, inclinationDeg: 48.3, nodeDeg: 118.9, argumentOfPeriastronDeg: 73.4,
}

export interface PairHouse {
  programmeId: string
  coordinator: AddedPerson
  /** Sent the measures. */
  observer: AddedPerson
  /** Neither coordinates nor measures; follows nothing yet. */
  member: AddedPerson
  target: TargetView
}

/** A programme with its people and one pair, before any measure. */
export async function addPairHouse(house: { ctx: Context }): Promise<PairHouse> {
  const programme = await addProgramme(house, { name: 'Northern pairs', leastMeasures: 8 })
  const coordinator = await addPerson(house, { displayName: 'Mirelle Tasque', coordinatorOf: [programme.id] })
  const observer = await addPerson(house, { displayName: 'Ossian Brandvik', isObserver: true })
  const member = await addPerson(house, { displayName: 'Wenna Ashgrove' })
  const target = await addTarget(coordinator.ctx, { programmeId: programme.id, kind: 'relative', name: 'Linden 12 AB', aliases: ['LND 12'], componentA: 'A', componentB: 'B' })
  return { programmeId: programme.id, coordinator, observer, member, target }
}

export interface SentMeasures {
  from: number
  count: number
  seed: number
  observer?: string
  stepYr?: number
}

/** A file of simulated measures, sent and fitted; answers the fit that waits. */
export async function sendPairMeasures({ coordinator, observer, target }: Pick<PairHouse, 'coordinator' | 'observer' | 'target'>, { from, count, seed, observer: credited, stepYr = 2.5 }: SentMeasures): Promise<FitView> {
  const epochs = unevenEpochs({ from, count, stepYr, seed })
  const noise = { sigmaThetaDeg: 0.8, sigmaRhoArcsec: 0.012, seed }
  const text = pairFile(simulatePair(TRUE_PAIR, epochs, noise), { ...noise, ...(credited === undefined ? {} : { observer: credited }) })
  await uploadAndSend(observer.ctx, { text, fileName: `measures-${from}.csv`, target })
  await runJobs(observer.ctx)
  return await latestFit(coordinator.ctx, target.id)
}

/** Twenty measures over fifty years, fitted and accepted. */
export async function acceptedPairFit(pair: PairHouse): Promise<FitView> {
  const fit = await sendPairMeasures(pair, { from: 1974.2, count: 20, seed: 12 })
  return await rule(pair.coordinator.ctx, fit, 'accept', 'The residuals show nothing that stands out.')
}
