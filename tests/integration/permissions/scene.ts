import { join } from 'node:path'
import { addPairHouse, acceptedPairFit, sendPairMeasures } from '../../builders/published-pair'
import { addPerson, addProgramme } from '../../builders/people'
import { createTestHouse } from '../../builders/test-house'
import { uploadText } from '../../builders/uploads'
import { addTarget, publish } from '../../builders/work'
import { followTarget } from '../../../server/services/targets/follow-target'
import { invitePerson } from '../../../server/services/people/invite-person'

/** One person a role; `owner` is the observer who owns the batches, `stranger` coordinates another programme. */
export const ROLES = ['visitor', 'member', 'observer', 'owner', 'coordinator', 'stranger', 'administrator'] as const
export type Role = (typeof ROLES)[number]

/** What a path or a body may name. */
export type Thing
  = 'programme' | 'publishedTarget' | 'target' | 'person' | 'draftBatch' | 'badRow' | 'sentBatch' | 'waitingFit' | 'acceptedFit' | 'measure'
    | 'invitationToken' | 'unsubscribeToken' | 'ownerEmail' | 'password'

export interface Scene {
  databaseFile: string
  sessions: Record<Role, string | null>
  things: Record<Thing, string>
  versions: { waitingFit: number, acceptedFit: number, edition: number }
}

const PASSWORD = 'a long enough password'

/** A house in which every route has something to act on, kept as a file that each case begins with a copy of. */
export async function makeScene(folder: string): Promise<Scene> {
  const house = await createTestHouse({ seed: 'scene' })
  const pair = await addPairHouse(house)
  const { coordinator, observer: owner, member, programmeId, target: published } = pair
  const elsewhere = await addProgramme(house, { name: 'Solar diameters' })
  const stranger = await addPerson(house, { displayName: 'R. Quellmann', coordinatorOf: [elsewhere.id] })
  const observer = await addPerson(house, { displayName: 'T. Orrowin', isObserver: true })
  const administrator = await addPerson(house, { displayName: 'Ilka Soundraven', isAdministrator: true })

  await followTarget(member.ctx, published.id)
  await publish(coordinator.ctx, await acceptedPairFit(pair))
  const [accepted, target] = [await addPair(2), await addPair(3)]
  const acceptedFit = await acceptedPairFit({ ...pair, target: accepted })
  const waitingFit = await sendPairMeasures({ ...pair, target }, { from: 1974.2, count: 20, seed: 3 })
  const draft = await uploadText(owner.ctx, { text: 'epoch,theta_deg,rho_arcsec\n2024.5,361,0.9\n2025.5,120,0.8\n', targetId: target.id })
  const { url } = await invitePerson(administrator.ctx, { isObserver: true, isAdministrator: false })
  const letter = await house.ctx.reads.selectFrom('mail_out').select('unsubscribe_url').where('unsubscribe_url', 'is not', null).limit(1).executeTakeFirstOrThrow()

  const databaseFile = join(folder, 'scene.sqlite3')
  await house.close({ keepAs: databaseFile })
  return {
    databaseFile,
    sessions: {
      visitor: null, member: member.sessionId, observer: observer.sessionId, owner: owner.sessionId,
      coordinator: coordinator.sessionId, stranger: stranger.sessionId, administrator: administrator.sessionId,
    },
    things: {
      programme: programmeId, publishedTarget: published.id, target: target.id, person: member.id,
      draftBatch: draft.id, badRow: draft.items.find(row => row.state === 'bad')!.id, sentBatch: waitingFit.batches[0]!.id,
      waitingFit: waitingFit.id, acceptedFit: acceptedFit.id, measure: waitingFit.measures[0]!.id,
      invitationToken: url.split('/').at(-1)!, unsubscribeToken: letter.unsubscribe_url!.split('/').at(-1)!, ownerEmail: owner.email, password: PASSWORD,
    },
    versions: { waitingFit: waitingFit.version, acceptedFit: acceptedFit.version, edition: 1 },
  }

  function addPair(number: number) {
    return addTarget(coordinator.ctx, { programmeId, kind: 'relative', name: `Linden ${number} AB`, componentA: 'A', componentB: 'B' })
  }
}
