import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { signIn } from '../../../server/services/people/sign-in'
import { listDesk } from '../../../server/services/desk/list-desk'
import { listEditions } from '../../../server/services/editions/list-editions'
import { readEdition } from '../../../server/services/editions/read-edition'
import { readFit } from '../../../server/services/fits/read-fit'
import { readTarget } from '../../../server/services/targets/read-target'
import { CAST_NAMES } from '../../builders/demo/cast'
import { fillDemo } from '../../builders/demo/demo-story'
import type { Demo } from '../../builders/demo/demo-story'
import { TRUE_EARTH } from '../../builders/demo/earth'
import { TRUE_HAZEL_3_AC } from '../../builders/demo/hazel-3-ac'
import { TRUE_ILMENAU_4 } from '../../builders/demo/ilmenau-4'
import { TRUE_LINDEN_12 } from '../../builders/demo/linden-12'
import { renewPasswords } from '../../builders/demo/renew-passwords'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { runJobs } from '../../builders/work'

let house: TestHouse
let demo: Demo
const passwords = CAST_NAMES.map(name => `a password for ${name}`)
beforeAll(async () => {
  house = await createTestHouse()
  demo = await fillDemo({ house, passwords })
})
afterAll(() => house.close())

const within = (element: { value: number, sigma: number | null }, truth: number, sigmas = 4) => {
  expect(element.sigma).toBeGreaterThan(0)
  expect(Math.abs(element.value - truth)).toBeLessThan(sigmas * element.sigma!)
}

describe('the demo', () => {
  it('publishes the pair twice, and once each the straight pair, the comet and the body in the plane', async () => {
    const { items } = await listEditions(house.ctx, {})
    expect(items.map(item => [item.targetName, item.number])).toEqual([['Linden 12 AB', 2], ['Hazel 3 AC', 1], ['Comet Ilmenau 4', 1], ['Earth about the Sun', 1]])
    expect(await readEdition(house.ctx, demo.linden12.id, 1)).toMatchObject({ state: 'superseded', supersededBy: 2 })
  })

  it('finds the true orbit of the pair within its errors, with the mistyped measure set aside for a reason', async () => {
    const { elements, snapshot, observers } = await readEdition(house.ctx, demo.linden12.id, 2)
    within(elements.period!, TRUE_LINDEN_12.periodYr)
    within(elements.eccentricity!, TRUE_LINDEN_12.eccentricity)
    within(elements.semiMajorAxis!, TRUE_LINDEN_12.semiMajorAxisArcsec)
    within(elements.inclination!, TRUE_LINDEN_12.inclinationDeg)
    expect(observers).toBe(4)
    const left = snapshot.measures.filter(measure => measure.role === 'set-aside')
    expect(left).toMatchObject([{ observer: 'T. Orrowin', decidedBy: 'Mirelle Tasque', reason: expect.stringContaining('mistyped') }])
    const residual = snapshot.result.residuals.find(({ id }) => id === left[0]!.id)
    expect(Math.abs(residual!.observedMinusComputed.thetaDeg!)).toBeGreaterThan(15)
  })

  it('finds the true shape of the orbit in the diameters', async () => {
    const { elements, snapshot } = await readEdition(house.ctx, demo.earth.id, 1)
    within(elements.eccentricity!, TRUE_EARTH.eccentricity)
    within(elements.semiLatusRectum!, TRUE_EARTH.semiLatusRectum)
    within(elements.periapsisDirection!, TRUE_EARTH.periapsisDirectionDeg)
    expect(snapshot.target.caution).toBe('sun')
    expect(snapshot.predictions).toHaveLength(36)
  })

  it('finds the true orbit of the comet within its errors, unsettled whether it is bound, and two weeks later with the planets', async () => {
    const { elements, snapshot, summary } = await readEdition(house.ctx, demo.ilmenau4.id, 1)
    within(elements.perihelionDistance!, TRUE_ILMENAU_4.perihelionDistanceAu)
    within(elements.eccentricity!, TRUE_ILMENAU_4.eccentricity)
    within(elements.inclination!, TRUE_ILMENAU_4.inclinationDeg)
    within(elements.perihelionTime!, TRUE_ILMENAU_4.perihelionTimeJdTt)
    expect(summary).toMatch(/parabola not excluded; honest over its 27-day arc$/)
    expect(snapshot.measures).toHaveLength(39)
    const { fit } = await readTarget(demo.cast.people.mirelle.ctx, demo.ilmenau4.id, null)
    expect(fit).toMatchObject({ state: 'done', unmetRules: [], result: { honestArc: { standing: 'perturbed' } } })
  })

  it('warns that the motion of the wide pair is straight and publishes the line', async () => {
    const { fits } = await readTarget(demo.cast.people.mirelle.ctx, demo.hazel3Ac.id, null)
    const orbit = await readFit(demo.cast.people.mirelle.ctx, fits.find(fit => fit.number === 2)!.id)
    expect(orbit.result?.warnings.join(' ')).toContain('The motion so far is straight')
    const { summary, elements } = await readEdition(house.ctx, demo.hazel3Ac.id, 1)
    expect(summary).toMatch(/^Motion so far straight: .* toward \d/)
    within(elements.motion!, Math.hypot(TRUE_HAZEL_3_AC.eastArcsecPerYr, TRUE_HAZEL_3_AC.northArcsecPerYr))
  })

  it('leaves two fits waiting, one of which the rules will not let be published, and one that could not be made', async () => {
    const waiting = await listDesk(demo.cast.people.mirelle.ctx)
    expect(waiting.map(item => [item.targetName, item.fit.state])).toEqual([['Comet Ilmenau 4', 'done'], ['Linden 7 AB', 'done'], ['Hazel 3 AB', 'failed']])
    const { fit } = await readTarget(demo.cast.people.mirelle.ctx, demo.linden7.id, null)
    expect(fit?.unmetRules.join(' ')).toContain('0.3 of a turn')
  })

  it('keeps the rows of Hazel 3 that cannot be read in the draft of their observer', async () => {
    const rows = await house.database.reads.selectFrom('batch_row').innerJoin('batch', 'batch.id', 'batch_row.batch_id')
      .select(['batch_row.state']).where('file_name', '=', 'hazel-3-first-season.csv').orderBy('row_number').execute()
    expect(rows.map(row => row.state)).toEqual(['sent', 'bad', 'bad', 'bad', 'sent', 'sent'])
  })

  it('has the letters of the story in the outbox, for the follower one an edition', async () => {
    await runJobs(house.ctx, house.mailTransport)
    const { email } = demo.signIns.find(person => person.name === 'Wenna Ashgrove')!
    expect(house.mail.filter(mail => mail.to === email).map(mail => mail.subject)).toEqual([
      'Earth about the Sun: edition 1 is published', 'Linden 12 AB: edition 1 is published', 'Linden 12 AB: edition 2 is published',
    ])
  })

  it('lets everybody sign in with the password given', async () => {
    for (const { email, password } of demo.signIns) expect((await signIn(house.ctx, { email, password }, '127.0.0.1')).me.email).toBe(email)
  })

  it('takes new passwords for the same people, after which the old ones no longer open', async () => {
    const renewed = await renewPasswords(house.ctx, passwords.map(password => `${password}, renewed`))
    expect(renewed.map(person => person.email)).toEqual(demo.signIns.map(person => person.email))
    const { email, password } = renewed[2]!
    expect((await signIn(house.ctx, { email, password }, '127.0.0.1')).me.email).toBe(email)
    await expect(signIn(house.ctx, { email, password: passwords[2]! }, '127.0.0.1')).rejects.toMatchObject({ code: 'sign-in-failed' })
  })
})
