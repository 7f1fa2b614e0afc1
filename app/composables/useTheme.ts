export const THEMES = ['day', 'dusk', 'night'] as const
export type Theme = (typeof THEMES)[number]

const YEAR_S = 365 * 24 * 3600

/** The theme chosen, kept in a cookie so that the server already renders the page in it; without a choice there is no cookie, and it is day. */
export function useTheme() {
  const theme = useCookie<Theme | null>('semilatus-theme', { maxAge: YEAR_S, sameSite: 'lax', path: '/' })
  const shown = computed<Theme>(() => THEMES.find(known => known === theme.value) ?? 'day')
  return {
    theme: shown,
    choose(next: Theme) {
      theme.value = next
    },
  }
}
