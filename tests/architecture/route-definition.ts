import ts from 'typescript'

export interface RouteDefinitionFound {
  /** The function whose call is exported by default; null where something else is. */
  definer: string | null
  /** The module it comes from, as written. */
  from: string | null
  /** The access that is asked for; null where it is missing or not written out. */
  access: string | null
}

/** What a route file exports by default. */
export function readRouteDefinition(text: string): RouteDefinitionFound {
  const source = ts.createSourceFile('route.ts', text, ts.ScriptTarget.Latest, true)
  const exported = source.statements.find((statement): statement is ts.ExportAssignment => ts.isExportAssignment(statement) && !statement.isExportEquals)
  const call = exported?.expression
  if (!call || !ts.isCallExpression(call) || !ts.isIdentifier(call.expression)) return { definer: null, from: null, access: null }
  const definer = call.expression.text
  return { definer, from: moduleOf(source, definer), access: accessOf(call.arguments[0]) }
}

function moduleOf(source: ts.SourceFile, name: string): string | null {
  for (const statement of source.statements) {
    if (!ts.isImportDeclaration(statement)) continue
    const bindings = statement.importClause?.namedBindings
    const isHere = bindings && ts.isNamedImports(bindings) && bindings.elements.some(element => element.name.text === name && !element.propertyName)
    if (isHere && ts.isStringLiteral(statement.moduleSpecifier)) return statement.moduleSpecifier.text
  }
  return null
}

function accessOf(definition: ts.Expression | undefined): string | null {
  if (!definition || !ts.isObjectLiteralExpression(definition)) return null
  const property = definition.properties.find((candidate): candidate is ts.PropertyAssignment => ts.isPropertyAssignment(candidate) && candidate.name.getText() === 'access')
  return property && ts.isStringLiteral(property.initializer) ? property.initializer.text : null
}
