import { describe, expect, it } from 'vitest'
import { publishingCase, unmetRules } from '../../../../server/domain/publishing-rules'
import { pairResult, planeResult, solarResult } from '../../../builders/fit-result'

const RULES = { leastMeasures: 8, leastObservers: 2, leastArcTurns: 0.5, needsSecondConsent: true }
const MET = { measuresUsed: 8, observersUsed: 2, isOrbit: true, arcTurns: 0.5, hindrances: [], consents: 1 }

describe("the programme's rules for publishing", () => {
  it('are met at their very limits', () => {
    expect(unmetRules(RULES, MET)).toEqual([])
  })

  it.each([
    ['measures', { measuresUsed: 7 }, /at least 8 measures; 7 are used/],
    ['observers', { observersUsed: 1 }, /at least 2 observers; the measures used are by 1/],
    ['the arc', { arcTurns: 0.49 }, /0\.5 of a turn; these cover 0\.49/],
    ['an arc nobody knows', { arcTurns: null }, /how much these cover is not known/],
    ['consent', { consents: 0 }, /consent of a second coordinator/],
  ])('name what is missing: %s', (_what, lack, sentence) => {
    const unmet = unmetRules(RULES, { ...MET, ...lack })
    expect(unmet).toHaveLength(1)
    expect(unmet[0]).toMatch(sentence)
  })

  it('do not ask for an arc where the programme does not', () => {
    expect(unmetRules({ ...RULES, leastArcTurns: 0 }, { ...MET, arcTurns: null })).toEqual([])
  })

  it('ask for no part of a turn of a motion that is straight', () => {
    expect(unmetRules(RULES, { ...publishingCase(pairResult({}, { model: 'line' }), 1), measuresUsed: 8, observersUsed: 2 })).toEqual([])
  })

  it('count what is used, and take the directions covered as the arc where there are no times', () => {
    const pair = pairResult()
    pair.statistics = { ...pair.statistics, used: 19, arc: { ...pair.statistics.arc, turns: 0.8 }, byObserver: [{ observer: 'T. Orrowin', measures: 19, rms: {}, bias: {} }, { observer: 'R. Quellmann', measures: 0, rms: {}, bias: {} }] }
    expect(publishingCase(pair, 0)).toEqual({ measuresUsed: 19, observersUsed: 1, isOrbit: true, arcTurns: 0.8, hindrances: [], consents: 0 })
    const plane = planeResult()
    plane.statistics = { ...plane.statistics, arc: { ...plane.statistics.arc, trueAnomalyCoveredDeg: 270 } }
    expect(publishingCase(plane, 0).arcTurns).toBe(0.75)
  })
})

describe('an orbit about the Sun', () => {
  const tested = { ...solarResult().statistics, degreesOfFreedom: 12 }
  const arc = (standing: 'honest' | 'strained' | 'needs-perturbations' | 'perturbed') => ({ ...solarResult().honestArc!, standing })
  const ofResult = (rest: Parameters<typeof solarResult>[1]) => publishingCase(solarResult({}, { statistics: tested, ...rest }), 0).hindrances

  it.each(['honest', 'perturbed'] as const)('is open for an edition where its arc is %s', (standing) => {
    expect(ofResult({ honestArc: arc(standing) })).toEqual([])
  })

  it.each(['strained', 'needs-perturbations'] as const)('has no edition where its arc is %s, whatever the programme asks for', (standing) => {
    const hindrances = ofResult({ honestArc: arc(standing) })
    expect(hindrances).toHaveLength(1)
    expect(hindrances[0]).toMatch(/No edition goes past the arc/)
    expect(unmetRules({ leastMeasures: 1, leastObservers: 1, leastArcTurns: 0, needsSecondConsent: false }, { ...MET, hindrances })).toEqual(hindrances)
  })

  it('has no edition where three measures are all there is', () => {
    expect(ofResult({ statistics: { ...tested, degreesOfFreedom: 0 }, alternatives: [{ deltaChiSquare: 0, elements: {} }] })[0]).toMatch(/another orbit passes through them as well.*one measure more/)
  })
})
