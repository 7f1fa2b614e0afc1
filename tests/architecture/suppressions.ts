const SUPPRESSION = /eslint-disable|@ts-(?:ignore|expect-error|nocheck)|(?:v8|c8|istanbul) ignore/
/** What follows the directive and its rules must be some words. */
const ESLINT_REASON = /eslint-disable(?:-next-line|-line)?[^\n]*?\s--\s+(?:\S+\s+){2,}\S+/
const TS_REASON = /@ts-(?:ignore|expect-error|nocheck)[:\s-]+(?:\S+\s+){2,}\S+/
const COVERAGE_REASON = /ignore \w+(?: \d+)?\s+--\s+(?:\S+\s+){2,}\S+/

/** The lines, from 1, of comments that switch a rule off without saying why. */
export function unexplainedSuppressions(text: string): number[] {
  return text.split('\n').flatMap((line, i) => (isSuppression(line) && !isExplained(line) ? [i + 1] : []))
}

/** Only in comments: a text that names the directive, as this file does, suppresses nothing. */
function isSuppression(line: string): boolean {
  const comment = /(?:^|\s)(?:\/\/|\/\*|<!--)\s*(.*)$/.exec(line)?.[1] ?? ''
  return SUPPRESSION.test(comment.slice(0, 24))
}

function isExplained(line: string): boolean {
  const plain = line.replace(/\*\/|-->/g, '')
  return ESLINT_REASON.test(plain) || TS_REASON.test(plain) || COVERAGE_REASON.test(plain)
}
