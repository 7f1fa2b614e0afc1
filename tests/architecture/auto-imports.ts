import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import ts from 'typescript'
import type { FoundImport } from './read-imports'
import { ROOT } from './resolve-import'

const DECLARATION = /^\s*const (\w+): typeof import\('([^']+)'\)/gm
/** Rooms of the browser live by Nuxt's own words; these do not. */
const CHECKED = /^(?:server|shared|fitting)\//

let sources: ReadonlyMap<string, string> | null = null

/** What Nitro puts into every server file without an import, by name, with the package it comes from. */
function autoImported(): ReadonlyMap<string, string> {
  const file = join(ROOT, '.nuxt/types/nitro-imports.d.ts')
  if (!existsSync(file)) throw new Error(`${file} is missing; run "npx nuxt prepare" first`)
  sources ??= new Map([...readFileSync(file, 'utf8').matchAll(DECLARATION)].map(([, name, path]) => [name!, packageOf(path!)]))
  return sources
}

function packageOf(path: string): string {
  return /node_modules\/((?:@[^/]+\/)?[^/]+)/.exec(path)?.[1] ?? path
}

/** Uses of auto-imported functions: imports in all but writing. */
export function readAutoImports(path: string, text: string): FoundImport[] {
  if (!CHECKED.test(path) || !path.endsWith('.ts')) return []
  const source = ts.createSourceFile(path, text, ts.ScriptTarget.Latest, true)
  const declared = new Set<string>()
  const used = new Map<string, number>()
  const visit = (node: ts.Node): void => {
    if (ts.isIdentifier(node)) {
      if (isDeclaration(node)) declared.add(node.text)
      else if (isFreeUse(node) && !used.has(node.text)) used.set(node.text, source.getLineAndCharacterOfPosition(node.getStart()).line + 1)
    }
    ts.forEachChild(node, visit)
  }
  visit(source)
  return [...used].flatMap(([name, line]) => {
    const from = declared.has(name) ? undefined : autoImported().get(name)
    return from ? [{ specifier: from, form: `auto-import of ${name} from`, isTypeOnly: false, values: [name], line }] : []
  })
}

function isDeclaration(node: ts.Identifier): boolean {
  const { parent } = node
  const isNamed = ts.isVariableDeclaration(parent) || ts.isParameter(parent) || ts.isFunctionDeclaration(parent) || ts.isFunctionExpression(parent)
    || ts.isClassDeclaration(parent) || ts.isBindingElement(parent) || ts.isImportSpecifier(parent) || ts.isImportClause(parent) || ts.isNamespaceImport(parent)
    || ts.isInterfaceDeclaration(parent) || ts.isTypeAliasDeclaration(parent) || ts.isTypeParameterDeclaration(parent)
  return isNamed && (parent as ts.NamedDeclaration).name === node
}

/** A name that is looked up: not a property behind a dot, a key, or a name that an export gives. */
function isFreeUse(node: ts.Identifier): boolean {
  const { parent } = node
  if (ts.isPropertyAccessExpression(parent)) return parent.expression === node
  if (ts.isPropertyAssignment(parent)) return parent.initializer === node
  if (ts.isQualifiedName(parent) || ts.isTypeReferenceNode(parent)) return false
  return !(ts.isMethodDeclaration(parent) || ts.isMethodSignature(parent) || ts.isPropertySignature(parent) || ts.isPropertyDeclaration(parent)
    || ts.isImportSpecifier(parent) || ts.isExportSpecifier(parent) || ts.isBindingElement(parent) || ts.isGetAccessorDeclaration(parent) || ts.isEnumMember(parent) || ts.isLabeledStatement(parent))
}
