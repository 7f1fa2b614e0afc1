export const THEMES = ['day', 'dusk', 'night'] as const
export type Theme = (typeof THEMES)[number]

const YEAR_S = 365 * 24 * 3600

/** The theme chosen, kept in a cookie so that the server already renders the page in it. */
export function useTheme() {
  const theme = useCookie<Theme>('semilatus-theme', { default: () => 'day', maxAge: YEAR_S, sameSite: 'lax', path: '/' })
  const shown = computed<Theme>(() => (THEMES.includes(theme.value) ? theme.value : 'day'))
  return {
    theme: shown,
    choose(next: Theme) {
      theme.value = next
    },
  }
}
