import { useMutationObserver } from '@vueuse/core'

const NAMES = ['paper', 'sheet', 'ink', 'ink2', 'rule', 'grid', 'orbit', 'mark', 'band', 'o0', 'o1', 'o2', 'o3', 'o4'] as const
export type PlotColours = Record<(typeof NAMES)[number], string>

/** The theme's colours as values, for drawings that cannot use CSS variables; null until the page is mounted, read anew when the theme on the page changes. */
export function usePlotColours() {
  const colours = shallowRef<PlotColours | null>(null)

  function read() {
    const probe = document.body.appendChild(document.createElement('span'))
    colours.value = Object.fromEntries(NAMES.map((name) => {
      probe.style.color = `var(--${name})`
      return [name, getComputedStyle(probe).color]
    })) as PlotColours
    probe.remove()
  }

  onMounted(() => {
    read()
    // The attribute follows the choice a moment later: the page's colours are read when they are there.
    useMutationObserver(document.documentElement, read, { attributes: true, attributeFilter: ['data-theme'] })
  })
  return colours
}
