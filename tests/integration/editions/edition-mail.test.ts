import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { followTarget } from '../../../server/services/targets/follow-target'
import { readMailStop } from '../../../server/services/mail/read-mail-stop'
import { stopMail } from '../../../server/services/mail/stop-mail'
import { withdrawEdition } from '../../../server/services/editions/withdraw-edition'
import { addPerson } from '../../builders/people'
import { acceptedPairFit, addPairHouse, sendPairMeasures } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { publish, rule, runJobs, setAside } from '../../builders/work'

let house: TestHouse
let pair: PairHouse
beforeEach(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
})
afterEach(() => house.close())

/** Who was written to by a template, once the outbox is empty. */
async function readersOf(template: string): Promise<string[]> {
  await runJobs(house.ctx, house.mailTransport)
  const rows = await house.database.reads.selectFrom('mail_out').innerJoin('person', 'person.id', 'mail_out.person_id')
    .select(['person.display_name', 'mail_out.state']).where('template', '=', template).where('mail_out.state', '=', 'sent').orderBy('person.display_name').execute()
  return rows.map(row => row.display_name)
}

describe('the letters about an edition', () => {
  it('go to followers and to the people whose measures were used, and to nobody else', async () => {
    await followTarget(pair.member.ctx, pair.target.id)
    await addPerson(house, { displayName: 'Bystander Quill', isObserver: true })
    await publish(pair.coordinator.ctx, await acceptedPairFit(pair))
    expect(await readersOf('edition-published')).toEqual(['Ossian Brandvik', 'Wenna Ashgrove'])
    const toObserver = house.mail.find(mail => mail.to === pair.observer.email && mail.subject.includes('edition 1'))
    expect(toObserver?.bodyText).toContain('20 of the measures in it are yours')
    expect(toObserver?.bodyText).toContain(`/orbits/${pair.target.id}/1`)
    const toFollower = house.mail.find(mail => mail.to === pair.member.email)
    expect(toFollower?.bodyText).not.toContain('yours')
  })

  it('do not go to an observer all of whose measures were set aside', async () => {
    const other = await addPerson(house, { displayName: 'Ilka Soundraven', isObserver: true })
    await acceptedPairFit(pair)
    const fit = await sendPairMeasures({ ...pair, observer: other }, { from: 2024.4, count: 1, seed: 3 })
    const late = fit.measures.find(measure => measure.observer === 'Ilka Soundraven')!
    const refit = await setAside(pair.coordinator.ctx, fit, [{ measureId: late.id, reason: 'the wrong star' }])
    await publish(pair.coordinator.ctx, await rule(pair.coordinator.ctx, refit, 'accept', 'sound'))
    expect(await readersOf('edition-published')).toEqual(['Ossian Brandvik'])
  })

  it('leave out who stopped mail about this target', async () => {
    await followTarget(pair.member.ctx, pair.target.id)
    await publish(pair.coordinator.ctx, await acceptedPairFit(pair))
    await runJobs(house.ctx, house.mailTransport)
    const link = house.mail.find(mail => mail.to === pair.member.email)!.unsubscribeUrl!
    await stopMail(house.ctx, link.split('/').at(-1)!, 'target')
    const before = house.mail.length
    const fit = await sendPairMeasures(pair, { from: 2024.4, count: 5, seed: 5, stepYr: 0.4 })
    await publish(pair.coordinator.ctx, await rule(pair.coordinator.ctx, fit, 'accept', 'fits well'))
    await runJobs(house.ctx, house.mailTransport)
    expect(house.mail.slice(before).map(mail => mail.to)).not.toContain(pair.member.email)
    expect(house.mail.slice(before).some(mail => mail.subject.includes('edition 2'))).toBe(true)
  })

  it('come again to who follows the target anew after stopping all mail, and about that target alone', async () => {
    await followTarget(pair.member.ctx, pair.target.id)
    await publish(pair.coordinator.ctx, await acceptedPairFit(pair))
    await runJobs(house.ctx, house.mailTransport)
    const token = house.mail.find(mail => mail.to === pair.member.email)!.unsubscribeUrl!.split('/').at(-1)!
    await stopMail(house.ctx, token, 'all')
    expect(await readMailStop(house.ctx, token)).toMatchObject({ isAllStopped: true, isTargetStopped: true })
    expect(await house.database.reads.selectFrom('follow').selectAll().where('person_id', '=', pair.member.id).execute()).toEqual([])

    await followTarget(pair.member.ctx, pair.target.id)
    expect(await readMailStop(house.ctx, token)).toMatchObject({ isAllStopped: false, isTargetStopped: false })
    const fit = await sendPairMeasures(pair, { from: 2024.4, count: 5, seed: 5, stepYr: 0.4 })
    await publish(pair.coordinator.ctx, await rule(pair.coordinator.ctx, fit, 'accept', 'fits well'))
    await runJobs(house.ctx, house.mailTransport)
    expect(house.mail.filter(mail => mail.to === pair.member.email).map(mail => mail.subject)).toEqual([
      'Linden 12 AB: edition 1 is published', 'Linden 12 AB: edition 2 is published',
    ])

    await stopMail(house.ctx, token, 'all')
    expect(await readMailStop(house.ctx, token)).toMatchObject({ isAllStopped: true })
  })

  it('tell the same readers when the edition is withdrawn', async () => {
    await followTarget(pair.member.ctx, pair.target.id)
    const edition = await publish(pair.coordinator.ctx, await acceptedPairFit(pair))
    await withdrawEdition(pair.coordinator.ctx, { targetId: edition.targetId, number: 1, reason: 'The clock was an hour off.', seenVersion: 1 })
    expect(await readersOf('edition-withdrawn')).toEqual(['Ossian Brandvik', 'Wenna Ashgrove'])
    expect(house.mail.find(mail => mail.subject.includes('withdrawn'))?.bodyText).toContain('The clock was an hour off.')
  })
})

describe('the letters about the work', () => {
  it('tell the coordinators when a fit waits, and the owner of the batch what was ruled', async () => {
    await acceptedPairFit(pair)
    expect(await readersOf('fit-waiting')).toEqual(['Mirelle Tasque'])
    expect(await readersOf('ruling-made')).toEqual(['Ossian Brandvik'])
    expect(house.mail.find(mail => mail.to === pair.observer.email)?.bodyText).toContain('The residuals show nothing')
  })

  it('do not tell a coordinator of the refit that she asked for herself', async () => {
    const fit = await sendPairMeasures(pair, { from: 1994, count: 12, seed: 3 })
    expect(await readersOf('fit-waiting')).toEqual(['Mirelle Tasque'])
    await setAside(pair.coordinator.ctx, fit, [{ measureId: fit.measures[3]!.id, reason: 'Clouds.' }])
    expect(await readersOf('fit-waiting')).toEqual(['Mirelle Tasque'])
  })
})
