import { describe, expect, it } from 'vitest'
import { canonicalJson } from '../../../../server/domain/canonical-json'
import { buildFitRequest, fitRequestText, fitRole } from '../../../../server/domain/fit-request'
import type { ParsedRow } from '../../../../shared/intake/parsed-row'
import { readRow } from '../../../../shared/intake/read-row'

const PAIR = { kind: 'relative', radius_unit: null, diameter_scale_arcmin: null } as const
const parsed = (cells: Record<string, string>, kind: 'relative' | 'plane'): ParsedRow => readRow(cells, kind).parsed!
const POLAR = parsed({ epoch: '2020.5', theta_deg: '90', rho_arcsec: '1.2', sigma_theta_deg: '1', sigma_rho_arcsec: '0.02' }, 'relative')
const LIMIT = parsed({ epoch: '2021.5', rho_limit_arcsec: '0.3' }, 'relative')

describe('the request of a fit', () => {
  it('turns degrees into radians and marks what is set aside', () => {
    const request = buildFitRequest(PAIR, [{ id: 'a', observer: 'T. Orrowin', row: POLAR }, { id: 'b', observer: 'T. Orrowin', row: LIMIT }], { setAside: new Set(['a']) })
    expect(request.kind).toBe('relative')
    expect(request.measures[0]).toMatchObject({ id: 'a', observer: 'T. Orrowin', setAside: true, position: { form: 'polar', thetaRad: Math.PI / 2, sigmaThetaRad: Math.PI / 180 } })
    expect(request.measures[1]).toMatchObject({ id: 'b', position: { form: 'limit', rhoLimitArcsec: 0.3 } })
    expect(request.measures[1]).not.toHaveProperty('setAside')
    expect(request.settings).toEqual({ seed: 1 })
  })

  it("states the target's unit and scale for a plane target, and the model where one is asked for", () => {
    const row = parsed({ phi_deg: '12', diameter_arcmin: '32.5' }, 'plane')
    const sun = { kind: 'plane', radius_unit: 'au', diameter_scale_arcmin: 31.99 } as const
    expect(buildFitRequest(sun, [{ id: 'a', observer: 'T. Orrowin', row }], { setAside: new Set() }).settings).toEqual({ seed: 1, radiusUnit: 'au', diameterScaleArcmin: 31.99 })
    expect(buildFitRequest(PAIR, [], { setAside: new Set(), model: 'line' }).settings).toEqual({ seed: 1, model: 'line' })
  })

  it('has the same canonical text where it is written measure by measure', async () => {
    const measures = [{ id: 'a', observer: 'Élodie "E." Tasque', row: POLAR }, { id: 'b', observer: 'T. Orrowin', row: LIMIT }]
    const options = { setAside: new Set(['b']), model: 'line' } as const
    expect(await fitRequestText(PAIR, measures, options)).toBe(canonicalJson(buildFitRequest(PAIR, measures, options)))
    expect(await fitRequestText(PAIR, [], options)).toBe(canonicalJson(buildFitRequest(PAIR, [], options)))
  })

  it('leaves limits out of the fit, whatever else was decided', () => {
    expect(fitRole(POLAR, false)).toBe('used')
    expect(fitRole(POLAR, true)).toBe('set-aside')
    expect(fitRole(LIMIT, false)).toBe('not-fitted')
  })
})
