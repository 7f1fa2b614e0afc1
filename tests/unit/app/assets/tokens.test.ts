import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'

const css = readFileSync(new URL('../../../../app/assets/css/tokens.css', import.meta.url), 'utf8')
const THEMES = ['day', 'dusk', 'night'] as const

function tokensOf(theme: string): Record<string, string> {
  const block = new RegExp(`\\[data-theme='${theme}'\\] \\{([^}]*)\\}`).exec(css)?.[1] ?? ''
  return Object.fromEntries([...block.matchAll(/--(\w+): (#[0-9a-f]{6,8});/g)].map(match => [match[1], match[2]]))
}

const channels = (hex: string) => [1, 3, 5].map(start => Number.parseInt(hex.slice(start, start + 2), 16))

/** Relative luminance and contrast: WCAG 2.2, definitions "relative luminance" and "contrast ratio". */
function luminance(hex: string): number {
  const [r, g, b] = channels(hex).map(value => value / 255).map(value => (value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4))
  return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!
}
function contrast(one: string, other: string): number {
  const [light, dark] = [luminance(one), luminance(other)].sort((a, b) => b - a)
  return (light! + 0.05) / (dark! + 0.05)
}

describe('the colours of the themes', () => {
  it('every theme names the same tokens', () => {
    const names = THEMES.map(theme => Object.keys(tokensOf(theme)).sort())
    expect(names[0]!.length).toBeGreaterThan(15)
    expect(names[1]).toEqual(names[0])
    expect(names[2]).toEqual(names[0])
  })

  it.each(Object.entries(tokensOf('night')))('in the night theme %s holds no green and no blue', (_name, hex) => {
    expect(channels(hex).slice(1)).toEqual([0, 0])
  })

  it.each(THEMES.flatMap(theme => ['ink', 'ink2', 'orbit', 'mark', 'good', 'hold', 'stop'].flatMap(text => ['paper', 'sheet'].map(ground => [theme, text, ground] as const))))(
    'in the %s theme text in %s on %s has a contrast of 4.5 or more', (theme, text, ground) => {
      const tokens = tokensOf(theme)
      expect(contrast(tokens[text]!, tokens[ground]!)).toBeGreaterThanOrEqual(4.5)
    },
  )

  it.each(THEMES)('in the %s theme text on a notice and on a main button can be read, and a control can be seen', (theme) => {
    const tokens = tokensOf(theme)
    for (const text of ['ink', 'ink2', 'mark']) expect(contrast(tokens[text]!, tokens.markbg!)).toBeGreaterThanOrEqual(4.5)
    expect(contrast(tokens.sheet!, tokens.orbit!)).toBeGreaterThanOrEqual(4.5)
    expect(contrast(tokens.sheet!, tokens.mark!)).toBeGreaterThanOrEqual(4.5)
    expect(contrast(tokens.edge!, tokens.sheet!)).toBeGreaterThanOrEqual(3)
  })

  it('no other style sheet of the app names a colour', () => {
    for (const file of ['controls.css', 'drawing.css', 'tailwind.css']) {
      const text = readFileSync(new URL(`../../../../app/assets/css/${file}`, import.meta.url), 'utf8')
      expect(text, file).not.toMatch(/#[0-9a-f]{3,8}\b|rgba?\(|hsla?\(/i)
    }
  })
})
