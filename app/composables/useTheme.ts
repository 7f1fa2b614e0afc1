export const THEMES = ['day', 'dusk', 'night'] as const
export type Theme = (typeof THEMES)[number]

const YEAR_S = 365 * 24 * 3600

/** The theme chosen, kept in a cookie so that the server already renders the page in it; without a choice there is no cookie, and it is day. */
export function useTheme() {
  const cookie = useCookie<Theme | null>('semilatus-theme', { maxAge: YEAR_S, sameSite: 'lax', path: '/' })
  // One state for the page, since each caller of useCookie has a ref of its own.
  const theme = useState<Theme>('theme', () => THEMES.find(known => known === cookie.value) ?? 'day')
  return {
    theme: readonly(theme),
    choose(next: Theme) {
      theme.value = next
      cookie.value = next
    },
  }
}
