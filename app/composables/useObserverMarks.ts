import { observerMarks } from '#shared/drawing/observer-marks'

/** The marks of a sheet's observers, and which one a measure wears. */
export function useObserverMarks(measures: () => readonly { id: string; observer: string }[]) {
  const marks = computed(() => observerMarks(measures().map(measure => measure.observer)))
  const byMeasure = computed(() => {
    const byObserver = new Map(marks.value.map(mark => [mark.observer, mark]))
    return new Map(measures().map(measure => [measure.id, byObserver.get(measure.observer)]))
  })
  return { marks, lookOf: (id: string) => byMeasure.value.get(id) }
}
