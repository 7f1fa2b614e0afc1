/**
 * What fitting/ may not use, so that a fit has the same bits in every engine and on every day. Each message says what to use instead.
 * @type {{ selector: string, message: string }[]}
 */
export const PORTABLE_SYNTAX = [
  {
    selector: "MemberExpression[object.name='Math']:not([computed=false][property.name=/^(?:sqrt|abs|floor|round|min|max)$/])",
    message: 'Math differs between engines here. Use fitting/elementary (sin, cos, atan2, exp, log, hypot, PI …); Math.sqrt, abs, floor, round, min and max are exact.',
  },
  {
    selector: ":not(MemberExpression) > Identifier[name='Math']",
    message: 'Name the function of Math at its use, so that it can be seen to be one of the exact ones.',
  },
  {
    selector: "BinaryExpression[operator='**'], AssignmentExpression[operator='**=']",
    message: 'Powers differ between engines. Multiply, or use exp and log of fitting/elementary.',
  },
  {
    selector: 'CallExpression[callee.property.name=/^(?:toLocale\\w*|localeCompare|normalize)$/]',
    message: 'This depends on the language of the machine. Compare with < and >, and format in shared/units.',
  },
  { selector: 'AwaitExpression, FunctionDeclaration[async=true], ArrowFunctionExpression[async=true]', message: 'The engine is synchronous: the host ends the worker to cancel.' },
  { selector: "CallExpression[callee.property.name='sort'][arguments.length=0]", message: 'Give the order: without one numbers are sorted as text.' },
]

const CLOCK = 'The engine has no clock. Elapsed time is the caller\'s to measure; epochs come with the measures.'
const NO_HOST = 'The engine knows neither Node nor browser. Take what you need as a parameter.'

/** @type {{ name: string, message: string }[]} */
export const PORTABLE_GLOBALS = [
  { name: 'Date', message: CLOCK },
  { name: 'performance', message: CLOCK },
  { name: 'Intl', message: 'Formatting belongs to shared/units.' },
  { name: 'crypto', message: 'Draws are seeded: use fitting/random.' },
  ...['globalThis', 'window', 'self', 'document', 'navigator', 'process', 'Buffer', 'console', 'fetch', 'setTimeout', 'setInterval', 'queueMicrotask', 'structuredClone', 'require', 'postMessage']
    .map(name => ({ name, message: NO_HOST })),
]
