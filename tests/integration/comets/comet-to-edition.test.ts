import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { fitOrbit } from '../../../fitting'
import type { FitRequest } from '../../../fitting/types'
import { canonicalJson } from '../../../server/domain/canonical-json'
import { mendRow } from '../../../server/services/batches/mend-row'
import { sendBatch } from '../../../server/services/batches/send-batch'
import { downloadEdition } from '../../../server/services/editions/download-edition'
import { listEditions } from '../../../server/services/editions/list-editions'
import { readEdition } from '../../../server/services/editions/read-edition'
import { readTarget } from '../../../server/services/targets/read-target'
import { readMeasures } from '../../../shared/intake/read-measures'
import type { EditionSnapshot } from '../../../shared/schemas/editions'
import type { TargetView } from '../../../shared/schemas/targets'
import { TRUE_ILMENAU_4 } from '../../builders/demo/ilmenau-4'
import { addPerson, addProgramme } from '../../builders/people'
import type { AddedPerson } from '../../builders/people'
import { cometFile } from '../../builders/simulated-comet'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { addTarget, latestFit, publish, rule, runJobs, setAside, upload, uploadAndSend } from '../../builders/work'

const SEASON = {
  station: 'Winter Hill', site: { longitudeEastDeg: -2.52, latitudeDeg: 53.63, heightM: 500 }, fromJdUtc: 2461056.29, nights: 7, stepDays: 4,
  exposuresANight: 3, sigmaArcsec: 0.5, seed: 7,
}

let house: TestHouse
let coordinator: AddedPerson
let observer: AddedPerson
let comet: TargetView
beforeEach(async () => {
  house = await createTestHouse()
  const programme = await addProgramme(house, { name: 'Bright comets', leastMeasures: 12 })
  coordinator = await addPerson(house, { displayName: 'Sefa Marrowby', coordinatorOf: [programme.id] })
  observer = await addPerson(house, { displayName: 'T. Orrowin', isObserver: true })
  comet = await addTarget(coordinator.ctx, { programmeId: programme.id, kind: 'equatorial', name: 'Comet Ilmenau 4' })
})
afterEach(() => house.close())

async function publishedComet() {
  await uploadAndSend(observer.ctx, { text: cometFile(TRUE_ILMENAU_4, SEASON), fileName: 'comet.csv', target: comet })
  await runJobs(observer.ctx)
  const accepted = await rule(coordinator.ctx, await latestFit(coordinator.ctx, comet.id), 'accept', 'The residuals scatter about zero.')
  return await publish(coordinator.ctx, accepted, 'First orbit.')
}

async function download(name: 'snapshot.json' | 'measures.csv' | 'ephemeris.csv' | 'elements.csv') {
  return (await downloadEdition(house.ctx, { targetId: comet.id, number: 1, name })).text
}

describe('a comet from upload to edition', () => {
  it('has its bad cell named, is mended, sent and fitted, and the same measures again are known', async () => {
    const text = cometFile(TRUE_ILMENAU_4, SEASON)
    const broken = text.replace(/^(.*\n[^,]*),(\d\d) \d\d /, '$1,$2 72 ')
    const draft = await upload(observer.ctx, { text: broken, fileName: 'comet.csv', target: comet })
    const bad = draft.items.find(row => row.state === 'bad')!
    expect(bad.problems).toMatchObject([{ column: 'ra_hms', reason: expect.stringContaining('60 or more') }])
    const right = readMeasures(text, { kind: 'equatorial' }).rows[0]!.cells.ra_hms!
    const mended = await mendRow(observer.ctx, { batchId: draft.id, rowId: bad.id, cells: { ra_hms: right } })
    expect(mended).toMatchObject({ good: 21, bad: 0 })
    await sendBatch(observer.ctx, draft.id)
    await runJobs(observer.ctx)
    const { result } = await latestFit(coordinator.ctx, comet.id)
    const q = result!.elements.perihelionDistance!
    expect(Math.abs(q.value - TRUE_ILMENAU_4.perihelionDistanceAu)).toBeLessThan(4 * q.sigma!)
    expect((await upload(observer.ctx, { text, fileName: 'again.csv', target: comet })).alreadyHere).toBe(21)
  })

  it('is refused without a station or as measures of another kind of target', async () => {
    const text = cometFile(TRUE_ILMENAU_4, SEASON)
    await expect(upload(observer.ctx, { text: 'time_utc,ra_deg,dec_deg\n2026-01-16.8,1,2\n', fileName: 'x.csv', target: comet })).rejects.toMatchObject({ code: 'file-unreadable', detail: expect.stringContaining('where it was measured') as string })
    await expect(upload(observer.ctx, { text, fileName: 'x.csv', target: { ...comet, kind: 'relative' } })).rejects.toMatchObject({ code: 'input-invalid' })
  })

  it('is published with its arc, and read back to the last bit from the snapshot and from the table of measures', async () => {
    const edition = await publishedComet()
    expect(edition.summary).toMatch(/^q 0\.88\d+ ± 0\.\d+ au, e 0\.99.*; honest over its 2\d-day arc$/)
    expect(edition.thumbnailSvg).toContain('<path')
    expect((await listEditions(house.ctx, {})).items).toMatchObject([{ kind: 'equatorial', targetName: 'Comet Ilmenau 4' }])

    const snapshot = JSON.parse(await download('snapshot.json')) as EditionSnapshot
    const again = fitOrbit(snapshot.request as FitRequest)
    expect(canonicalJson(again.ok && again.result)).toBe(canonicalJson(snapshot.result))
    const { rows, fileProblems } = readMeasures(await download('measures.csv'), { kind: 'equatorial' })
    expect([...fileProblems, ...rows.flatMap(row => row.problems)]).toEqual([])
    expect(rows.map(row => row.parsed?.kind === 'equatorial' && row.parsed.raDeg)).toEqual(snapshot.measures.map(measure => measure.sky!.raDeg))
  })

  it('offers places for the nights to come with distances, elongation and error', async () => {
    await publishedComet()
    const [heading, first, ...others] = (await download('ephemeris.csv')).trimEnd().split('\r\n')
    expect(heading).toMatch(/^jd_tt,ra_deg,sigma_ra_deg,dec_deg,sigma_dec_deg,error_major_arcsec.*distance_au,.*elongation_deg/)
    expect(first!.split(',').every(cell => Number.isFinite(Number(cell)))).toBe(true)
    expect(others).toHaveLength(31)
    expect(await download('elements.csv')).toContain('perihelion_distance,0.88')
    expect((await readEdition(house.ctx, comet.id, 1)).snapshot.result.honestArc?.standing).toBe('honest')
  })
})

describe('no edition of a comet', () => {
  it('stands on three measures, which any orbit through them fits', async () => {
    await uploadAndSend(observer.ctx, { text: cometFile(TRUE_ILMENAU_4, SEASON), fileName: 'comet.csv', target: comet })
    await runJobs(observer.ctx)
    const fit = await latestFit(coordinator.ctx, comet.id)
    const kept = [0, 10, 20].map(k => fit.measures[k]!.id)
    const few = await setAside(coordinator.ctx, fit, fit.measures.filter(measure => !kept.includes(measure.id)).map(measure => ({ measureId: measure.id, reason: 'to see what three say' })))
    expect(few.result?.statistics.used).toBe(3)
    const { fit: shown } = await readTarget(coordinator.ctx, comet.id, few.id)
    expect(shown?.unmetRules.join(' ')).toContain('passes through every measure by construction')
    const accepted = await rule(coordinator.ctx, few, 'accept', 'Only to try.')
    await expect(publish(coordinator.ctx, accepted)).rejects.toMatchObject({ code: 'rules-not-met' })
  })
})
