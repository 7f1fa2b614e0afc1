import { useTheme } from './useTheme'

const NAMES = ['paper', 'sheet', 'ink', 'ink2', 'rule', 'grid', 'orbit', 'mark', 'band', 'o0', 'o1', 'o2', 'o3', 'o4'] as const
export type PlotColours = Record<(typeof NAMES)[number], string>

/** The theme's colours as values, for drawings that cannot use CSS variables; null until the page is mounted, anew on a change of theme. */
export function usePlotColours() {
  const { theme } = useTheme()
  const colours = shallowRef<PlotColours | null>(null)

  function read() {
    const probe = document.body.appendChild(document.createElement('span'))
    colours.value = Object.fromEntries(NAMES.map((name) => {
      probe.style.color = `var(--${name})`
      return [name, getComputedStyle(probe).color]
    })) as PlotColours
    probe.remove()
  }

  onMounted(read)
  watch(theme, () => nextTick(read), { flush: 'post' })
  return colours
}
