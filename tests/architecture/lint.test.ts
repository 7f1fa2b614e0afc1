import { ESLint } from 'eslint'
import { describe, expect, it } from 'vitest'
import { ROOT } from './resolve-import'

const eslint = new ESLint({ cwd: ROOT })

async function complaintsAbout(path: string, text: string): Promise<string[]> {
  const [result] = await eslint.lintText(text, { filePath: `${ROOT}/${path}` })
  return (result?.messages ?? []).map(message => `${message.ruleId}: ${message.message}`)
}

describe('the lint rule for portable arithmetic', () => {
  it.each([
    ['sine', 'export const y = Math.sin(1)', 'fitting/elementary'],
    ['a computed name', "export const y = (name: 'sin') => Math[name](1)", 'fitting/elementary'],
    ['chance', "export const y = Math['random']()", 'fitting/elementary'],
    ['all of Math', 'const { sin } = Math\nexport const y = sin(1)', 'exact ones'],
    ['a power', 'export const y = (x: number) => x ** 2', 'Multiply'],
    ['a power by assignment', 'export const y = (x: number) => { x **= 2; return x }', 'Multiply'],
    ['the clock', 'export const y = Date.now()', 'no clock'],
    ['a date', 'export const y = new Date()', 'no clock'],
    ['the stopwatch', 'export const y = performance.now()', 'no clock'],
    ['languages', "export const y = new Intl.NumberFormat('en')", 'shared/units'],
    ['a language by the back door', "export const y = 'a'.localeCompare('b')", 'language of the machine'],
    ['strong chance', 'export const y = crypto.randomUUID()', 'seeded'],
    ['the host', "export const y = globalThis['Date']", 'neither Node nor browser'],
    ['waiting', 'export async function y() { return 1 }', 'synchronous'],
    ['sorting as text', 'export const y = [10, 9].sort()', 'Give the order'],
  ])('stops %s in fitting/ and says what to do', async (_what, text, remedy) => {
    expect((await complaintsAbout('fitting/conic/planted.ts', text)).join('\n')).toContain(remedy)
  })

  it('lets the exact functions through, and holds in fitting/ only', async () => {
    expect(await complaintsAbout('fitting/conic/planted.ts', 'export const y = (x: number) => Math.sqrt(Math.abs(x)) + Math.floor(x) + Math.round(x) + Math.min(x, Math.max(1, x))')).toEqual([])
    expect(await complaintsAbout('shared/units/planted.ts', 'export const y = (x: number) => Math.sin(x) ** 2')).toEqual([])
  })
})

describe('the lint rule of the rooms', () => {
  it.each([
    ['app/composables/planted.ts', "import { openDatabase } from '../../server/db/client'\nexport const y = openDatabase"],
    ['app/components/ui/UiPlanted.vue', "<script setup lang=\"ts\">\nimport { openDatabase } from '~~/server/db/client'\nconst y = openDatabase\n</script>\n<template><p>{{ y }}</p></template>"],
    ['server/domain/planted.ts', "export const y = () => import('node:fs')"],
    ['server/services/fits/planted.ts', "import { fitOrbit } from '../../../fitting'\nexport const y = fitOrbit"],
    ['shared/units/planted.ts', "export { sin } from '../../fitting/elementary'"],
    ['fitting/conic/planted.ts', "export type Y = typeof import('node:fs')"],
  ])('tells in the editor what may be imported instead: %s', async (path, text) => {
    const complaints = (await complaintsAbout(path, text)).filter(complaint => complaint.startsWith('rooms/imports'))
    expect(complaints).toHaveLength(1)
    expect(complaints[0]).toMatch(/may import|by its door/)
  })

  it('keeps the environment in one place', async () => {
    expect((await complaintsAbout('server/domain/planted.ts', 'export const y = process.env.HOME')).join()).toContain('server/config/env.ts')
  })

  it.each([
    ['app/composables/planted.ts', 'export const y = (x: number) => x.toFixed(2)'],
    ['server/domain/planted.ts', "export const y = (x: Date) => x.toLocaleDateString('en')"],
    ['app/components/ui/UiPlanted.vue', '<script setup lang="ts">\nconst x = 1\n</script>\n<template><p>{{ x.toPrecision(3) }}</p></template>'],
  ])('keeps formatting in one place: %s', async (path, text) => {
    expect((await complaintsAbout(path, text)).join()).toContain('shared/units')
  })
})
