import { posix } from 'node:path'

/** One forbidden import, written in one of the forms in which it can be written. */
export interface Plant {
  form: string
  extension: 'ts' | 'vue'
  text: string
}

const script = (form: string, text: string): Plant => ({ form, extension: 'ts', text })
const component = (form: string, text: string): Plant => ({ form, extension: 'vue', text: `${text}\n<template><p>planted</p></template>\n` })

/** Every form in which a module can be reached; each must be seen through. */
export function plantsOf(specifier: string): Plant[] {
  return [
    script('static', `import { x } from '${specifier}'\nexport const y = x`),
    script('over several lines', `import {\n  x,\n  z,\n} from "${specifier}"\nexport const y = [x, z]`),
    script('default', `import x from '${specifier}'\nexport const y = x`),
    script('namespace', `import * as x from '${specifier}'\nexport const y = x`),
    script('side effect', `import '${specifier}'`),
    script('type', `import type { X } from '${specifier}'\nexport type Y = X`),
    script('inline type', `import { type X } from '${specifier}'\nexport type Y = X`),
    script('dynamic', `export const load = () => import('${specifier}')`),
    script('dynamic with a template', `export const load = () => import(\`${specifier}\`)`),
    script('typeof import()', `export type Y = typeof import('${specifier}')`),
    script('type by import()', `export type Y = import('${specifier}').X`),
    script('re-export', `export { x } from '${specifier}'`),
    script('re-export of all', `export * from '${specifier}'`),
    script('re-export of types', `export type { X } from '${specifier}'`),
    script('import =', `import x = require('${specifier}')\nexport const y = x`),
    script('require', `const x = require('${specifier}')\nexport const y = x`),
    script('worker', `export const worker = () => new Worker(new URL('${specifier}.ts', import.meta.url), { type: 'module' })`),
    script('reference', `/// <reference path="${specifier}.ts" />\nexport {}`),
    component('script of a component', `<script lang="ts">\nimport { x } from '${specifier}'\nexport default { x }\n</script>`),
    component('script setup of a component', `<script setup lang="ts">\nimport { x } from '${specifier}'\nconst y = x\n</script>`),
    component('dynamic in a component', `<script setup lang="ts">\nconst y = await import('${specifier}')\n</script>`),
    component('script elsewhere', `<script lang="ts" src="${specifier}.ts"></script>`),
  ]
}

/** Forms that only name a file make no sense for a package. */
export const FILE_ONLY = ['worker', 'reference', 'script elsewhere']

/** The path by which one file imports another, without its extension. */
export function relativeSpecifier(from: string, to: string): string {
  const path = posix.relative(posix.dirname(from), to).replace(/\.ts$/, '')
  return path.startsWith('.') ? path : `./${path}`
}
