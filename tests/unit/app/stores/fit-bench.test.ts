import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, describe, expect, it } from 'vitest'
import type { FitMeasureView, FitView } from '#shared/schemas/fits'
import { useFitBench } from '../../../../app/stores/fitBench'
import { pairResult } from '../../../builders/fit-result'

const measure = (id: string, role: FitMeasureView['role'], reason: string | null = null) => ({ id, role, reason }) as FitMeasureView
const fit = { id: 'fit', number: 7, result: pairResult(), measures: [measure('good', 'used'), measure('old', 'set-aside', 'clouds'), measure('older', 'set-aside', 'tree')] } as unknown as FitView

beforeEach(() => setActivePinia(createPinia()))

describe('the bench of a fit', () => {
  it('hands the next fit what this one left out, as long as nothing is changed', () => {
    expect(useFitBench().setAsideList(fit)).toEqual([{ measureId: 'old', reason: 'clouds' }, { measureId: 'older', reason: 'tree' }])
  })

  it('adds what is newly set aside and leaves out what is taken back in', () => {
    const bench = useFitBench()
    bench.change('fit', 'good', { kind: 'set-aside', reason: 'turned camera' })
    bench.change('fit', 'old', { kind: 'take-back' })
    expect(bench.setAsideList(fit)).toEqual([{ measureId: 'older', reason: 'tree' }, { measureId: 'good', reason: 'turned camera' }])
  })

  it('forgets one change, or all of them, without touching those of another fit', () => {
    const bench = useFitBench()
    bench.change('fit', 'good', { kind: 'set-aside', reason: 'turned camera' })
    bench.change('fit', 'old', { kind: 'take-back' })
    bench.change('other', 'good', { kind: 'set-aside', reason: 'turned camera' })
    bench.undo('fit', 'good')
    expect(Object.keys(bench.changesOf('fit'))).toEqual(['old'])
    bench.dropAll('fit')
    expect(bench.changesOf('fit')).toEqual({})
    expect(Object.keys(bench.changesOf('other'))).toEqual(['good'])
  })

  it('remembers what a refit started from, for comparing', () => {
    const bench = useFitBench()
    bench.rememberBefore('new fit', fit)
    expect(bench.beforeByFit['new fit']).toEqual({ number: 7, elements: pairResult().elements, usedIds: [] })
  })
})
