import { addPerson, addProgramme } from '../../builders/people'
import { openHouseAt } from '../../builders/house-at'
import { addTarget } from '../../builders/work'
import { followTarget } from '../../../server/services/targets/follow-target'

export const PASSWORD = 'a long enough password'

/** A small group in a data folder: one programme, one pair without measures, an observer, a coordinator and a member who follows the pair. */
export async function fillHouse(dataDir: string) {
  const house = await openHouseAt({ dataDir, baseUrl: 'http://127.0.0.1', startAt: new Date().toISOString() })
  const programme = await addProgramme(house, { name: 'Northern pairs', leastMeasures: 12 })
  const coordinator = await addPerson(house, { displayName: 'Mirelle Tasque', password: PASSWORD, coordinatorOf: [programme.id] })
  const observer = await addPerson(house, { displayName: 'Ossian Brandvik', password: PASSWORD, isObserver: true })
  const follower = await addPerson(house, { displayName: 'Wenna Ashgrove', password: PASSWORD })
  const target = await addTarget(coordinator.ctx, { programmeId: programme.id, kind: 'relative', name: 'Linden 12 AB' })
  await followTarget(follower.ctx, target.id)
  await house.close()
  const signIns = { coordinator: coordinator.email, observer: observer.email, follower: follower.email, keeper: 'keeper@example.org' }
  return { signIns, targetId: target.id, programmeId: programme.id }
}
