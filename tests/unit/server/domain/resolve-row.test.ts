import { describe, expect, it } from 'vitest'
import { createRowJudge, measureKey, placeRow } from '../../../../server/domain/resolve-row'
import type { DraftRow, KnownTarget, Surroundings } from '../../../../server/domain/resolve-row'
import { readRow } from '../../../../shared/intake/read-row'

const LINDEN: KnownTarget = { id: 'linden', name: 'Linden 12 AB', kind: 'relative' }
const SUN: KnownTarget = { id: 'sun', name: 'Sun 2026', kind: 'plane' }
const AROUND: Surroundings = {
  kind: 'relative',
  targetsByNameKey: new Map([['linden 12 ab', LINDEN], ['sun 2026', SUN]]),
  defaultTarget: null,
  ownObserverName: 'Ossian Brandvik',
}

function row(rowNumber: number, cells: Record<string, string>): DraftRow {
  const { parsed, problems } = readRow({ epoch: '2020.5', theta_deg: '40', rho_arcsec: '1.2', ...cells }, 'relative', { rowNumber })
  return { id: `row ${rowNumber}`, rowNumber, parsed, problems }
}
function resolve(rows: DraftRow[], around = AROUND, isKnown: (targetId: string, key: string) => boolean = () => false) {
  const judge = createRowJudge(isKnown)
  return rows.map(found => judge(placeRow(found, around)))
}

describe('a row of a draft', () => {
  it('belongs to the target it names, however the name is written, else to the one chosen for the file', () => {
    expect(resolve([row(2, { target: 'LINDEN  12 ab' })])[0]).toEqual({ state: 'good', targetId: 'linden', problems: [] })
    expect(resolve([row(2, {})], { ...AROUND, defaultTarget: LINDEN })[0]).toMatchObject({ state: 'good', targetId: 'linden' })
  })

  it.each([
    ['an unknown name', { target: 'Linden 13' }, /No target here is called Linden 13/, /Check the spelling/],
    ['no name and none chosen', {}, /names no target/, /Choose the target/],
    ['a target of another kind', { target: 'Sun 2026' }, /takes measures of the kind "in the plane of the orbit"/, /upload the file as the other kind/],
  ])('is bad with a remedy for %s', (_what, cells, reason, remedy) => {
    const [resolution] = resolve([row(2, cells)])
    expect(resolution).toMatchObject({ state: 'bad', problems: [{ rowNumber: 2, column: 'target', severity: 'error' }] })
    expect(resolution!.problems[0]!.reason).toMatch(reason)
    expect(resolution!.problems[0]!.remedy).toMatch(remedy)
  })

  it('stays bad where it cannot be read, and is told so once', () => {
    expect(resolve([row(2, { rho_arcsec: '0.94O' })])[0]).toEqual({ state: 'bad', targetId: null, problems: [] })
    expect(resolve([row(2, { rho_arcsec: '0.94O' })], { ...AROUND, defaultTarget: LINDEN })[0]).toEqual({ state: 'bad', targetId: 'linden', problems: [] })
  })

  it('is already here where the target has this measure, however the number is written', () => {
    const rows = [row(2, { target: 'Linden 12 AB', theta_deg: '40.00', remarks: 'clouds' })]
    const key = measureKey(row(9, {}).parsed!, AROUND)
    const [resolution] = resolve(rows, AROUND, (targetId, found) => targetId === 'linden' && found === key)
    expect(resolution).toMatchObject({ state: 'already-here', targetId: 'linden', problems: [{ severity: 'note' }] })
  })

  it('repeats an earlier row only with the same target and observer', () => {
    const rows = [
      row(2, { target: 'Linden 12 AB' }),
      row(3, { target: 'Linden 12 AB', observer: 'ossian  brandvik' }),
      row(4, { target: 'Linden 12 AB', observer: 'T. Orrowin' }),
    ]
    expect(resolve(rows).map(found => found.state)).toEqual(['good', 'already-here', 'good'])
    expect(resolve(rows)[1]!.problems[0]!.reason).toMatch(/row 2/)
  })
})
