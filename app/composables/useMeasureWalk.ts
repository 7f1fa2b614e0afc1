const STEPS: Record<string, number> = { ArrowRight: 1, ArrowDown: 1, ArrowLeft: -1, ArrowUp: -1 }

/** Walking through measures by keyboard: arrows step, Home and End jump, Escape lets go. */
export function useMeasureWalk(order: () => string[], chosen: () => string | null, choose: (id: string | null) => void) {
  function target(key: string): string | null | undefined {
    const ids = order()
    if (key === 'Escape') return null
    if (key === 'Home') return ids[0]
    if (key === 'End') return ids.at(-1)
    const step = STEPS[key]
    if (step === undefined) return undefined
    const at = ids.indexOf(chosen() ?? '')
    if (at < 0) return step > 0 ? ids[0] : ids.at(-1)
    return ids[Math.min(ids.length - 1, Math.max(0, at + step))]
  }

  function walk(event: KeyboardEvent) {
    if (event.ctrlKey || event.metaKey || event.altKey) return
    const next = target(event.key)
    if (next === undefined) return
    event.preventDefault()
    choose(next)
  }

  return { walk }
}
