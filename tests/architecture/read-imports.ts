import { parse as parseVue } from 'vue/compiler-sfc'
import ts from 'typescript'

/** One import of a source text, in whatever form it is written. */
export interface FoundImport {
  /** Null where it is computed and cannot be known. */
  specifier: string | null
  form: string
  isTypeOnly: boolean
  /** Names of values that come in; "*" where all may. Types are not among them. */
  values: string[]
  line: number
}

/** Every import of a source file: static, dynamic, of types, re-exported, required, of a worker, in any <script> of a .vue file. */
export function readImports(path: string, text: string): FoundImport[] {
  if (!path.endsWith('.vue')) return readScript(path, text, 0)
  const { descriptor } = parseVue(text, { filename: path })
  return [descriptor.script, descriptor.scriptSetup].flatMap((block) => {
    if (!block) return []
    const inner = readScript(`${path}.ts`, block.content, block.loc.start.line - 1)
    return block.src ? [found(block.src, '<script src>', ['*'], block.loc.start.line), ...inner] : inner
  })
}

function found(specifier: string | null, form: string, values: string[], line: number): FoundImport {
  return { specifier, form, isTypeOnly: values.length === 0, values, line }
}

function readScript(path: string, text: string, lineOffset: number): FoundImport[] {
  const source = ts.createSourceFile(path, text, ts.ScriptTarget.Latest, true, path.endsWith('.mjs') ? ts.ScriptKind.JS : ts.ScriptKind.TS)
  const imports: FoundImport[] = []
  const visit = (node: ts.Node): void => {
    const read = readNode(node)
    if (read) imports.push(found(read.specifier, read.form, read.values, source.getLineAndCharacterOfPosition(node.getStart()).line + 1 + lineOffset))
    ts.forEachChild(node, visit)
  }
  visit(source)
  for (const reference of source.referencedFiles) imports.push(found(`./${reference.fileName}`, 'reference path', [], lineOffset + 1))
  return imports
}

type ReadNode = Pick<FoundImport, 'specifier' | 'form' | 'values'>

function readNode(node: ts.Node): ReadNode | null {
  if (ts.isImportDeclaration(node)) return { specifier: textOf(node.moduleSpecifier), form: 'import', values: valuesOfClause(node.importClause) }
  if (ts.isExportDeclaration(node) && node.moduleSpecifier) return { specifier: textOf(node.moduleSpecifier), form: 'export from', values: valuesOfExport(node) }
  if (ts.isImportEqualsDeclaration(node) && ts.isExternalModuleReference(node.moduleReference)) {
    return { specifier: textOf(node.moduleReference.expression), form: 'import =', values: node.isTypeOnly ? [] : ['*'] }
  }
  if (ts.isImportTypeNode(node)) {
    const specifier = ts.isLiteralTypeNode(node.argument) ? textOf(node.argument.literal) : null
    return { specifier, form: node.isTypeOf ? 'typeof import()' : 'import() type', values: [] }
  }
  if (ts.isCallExpression(node)) return readCall(node)
  return ts.isNewExpression(node) ? readModuleUrl(node) : null
}

function readCall(call: ts.CallExpression): ReadNode | null {
  const { expression, arguments: [first] } = call
  if (expression.kind === ts.SyntaxKind.ImportKeyword) return { specifier: textOf(first), form: 'import()', values: ['*'] }
  const isRequire = ts.isIdentifier(expression) && expression.text === 'require'
  return isRequire ? { specifier: textOf(first), form: 'require()', values: ['*'] } : null
}

/** new URL('./x.ts', import.meta.url) is how a worker's module is named. */
function readModuleUrl(node: ts.NewExpression): ReadNode | null {
  const [first, base] = node.arguments ?? []
  const isModuleUrl = ts.isIdentifier(node.expression) && node.expression.text === 'URL' && base?.getText() === 'import.meta.url'
  const specifier = isModuleUrl ? textOf(first) : null
  return specifier && /\.(?:[cm]?[jt]s|vue)$/.test(specifier) ? { specifier, form: 'new URL()', values: ['*'] } : null
}

function textOf(node: ts.Node | undefined): string | null {
  return node && ts.isStringLiteralLike(node) ? node.text : null
}

function valuesOfClause(clause: ts.ImportClause | undefined): string[] {
  if (!clause) return ['*']
  if (clause.isTypeOnly) return []
  const bindings = clause.namedBindings
  if (bindings && ts.isNamespaceImport(bindings)) return ['*']
  const named = bindings ? bindings.elements.filter(element => !element.isTypeOnly).map(element => (element.propertyName ?? element.name).text) : []
  return clause.name ? ['default', ...named] : named
}

function valuesOfExport(node: ts.ExportDeclaration): string[] {
  if (node.isTypeOnly) return []
  if (!node.exportClause || ts.isNamespaceExport(node.exportClause)) return ['*']
  return node.exportClause.elements.filter(element => !element.isTypeOnly).map(element => (element.propertyName ?? element.name).text)
}
