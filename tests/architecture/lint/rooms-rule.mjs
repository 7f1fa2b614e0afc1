import { existsSync } from 'node:fs'
import { builtinModules } from 'node:module'
import { join, posix, relative, sep } from 'node:path'

/**
 * The editor's rule of the import table. It resolves by simple means; imports.test.ts, which asks TypeScript, has the last word.
 * @param {string} root
 * @param {any} rooms what load-rooms.mjs gives
 * @returns {import('eslint').Rule.RuleModule}
 */
export function createRoomsRule(root, { roomOf, complaintAboutFile, complaintAboutPackage }) {
  return {
    meta: { type: 'problem', schema: [], messages: { forbidden: '{{complaint}}' } },
    create(context) {
      const path = relative(root, context.filename).split(sep).join('/')
      const room = roomOf(path)
      if (!room) return {}
      /** @param {any} node @param {unknown} specifier @param {string[]} values */
      const judge = (node, specifier, values) => {
        if (typeof specifier !== 'string') return
        const target = resolve(root, path, specifier.replace(/\?.*$/, ''))
        const complaint = target.file ? complaintAboutFile(room, target.file, { values }) : complaintAboutPackage(room, target.name, { values })
        if (complaint) context.report({ node, messageId: 'forbidden', data: { complaint } })
      }
      return {
        ImportDeclaration: node => judge(node, node.source.value, importedValues(node)),
        ExportAllDeclaration: node => judge(node, node.source.value, typeOnly(node) ? [] : ['*']),
        ExportNamedDeclaration: node => node.source && judge(node, node.source.value, typeOnly(node) ? [] : node.specifiers.filter(one => !typeOnly(one)).map(one => nameOf(one.local))),
        ImportExpression: node => judge(node, /** @type {any} */ (node.source).value, ['*']),
        /** @param {any} node */
        TSImportType: node => judge(node, node.source?.value ?? node.argument?.literal?.value, []),
        /** @param {any} node */
        TSExternalModuleReference: node => judge(node, node.expression.value, ['*']),
      }
    },
  }
}

/** @param {any} node */
const typeOnly = node => node.importKind === 'type' || node.exportKind === 'type'
/** @param {any} node */
const nameOf = node => node.name ?? node.value

/** @param {any} node */
function importedValues(node) {
  if (typeOnly(node)) return []
  if (node.specifiers.length === 0) return ['*']
  return node.specifiers.filter((/** @type {any} */ one) => !typeOnly(one)).map((/** @type {any} */ one) => {
    if (one.type === 'ImportNamespaceSpecifier') return '*'
    return one.type === 'ImportDefaultSpecifier' ? 'default' : nameOf(one.imported)
  })
}

/** @type {[RegExp, string][]} */
const ALIASES = [[/^(?:~~|@@)\//, ''], [/^[~@]\//, 'app/'], [/^#shared\//, 'shared/'], [/^#server\//, 'server/']]
const ENDINGS = ['', '.ts', '.mjs', '.vue', '.d.ts', '/index.ts']

/**
 * @param {string} root
 * @param {string} from
 * @param {string} specifier
 * @returns {{ file?: string, name: string }}
 */
function resolve(root, from, specifier) {
  if (specifier.startsWith('node:') || builtinModules.includes(specifier)) return { name: `node:${specifier.replace(/^node:/, '')}` }
  const alias = ALIASES.find(([pattern]) => pattern.test(specifier))
  const isRelative = specifier.startsWith('.')
  if (!alias && !isRelative) return { name: specifier.split('/').slice(0, specifier.startsWith('@') ? 2 : 1).join('/') }
  const path = alias ? specifier.replace(alias[0], alias[1]) : posix.join(posix.dirname(from), specifier)
  const ending = ENDINGS.find(end => end !== '' && existsSync(join(root, path + end))) ?? ''
  return { file: path + ending, name: specifier }
}
