/** A letter as it goes into the outbox: plain text; the line about stopping such mail is added when it is sent. */
export interface LetterText {
  subject: string
  bodyText: string
}

const LINE_WIDTH = 72

/** Sets a subject and paragraphs as plain text, lines of 72 characters; an address that people click stays whole. */
export function letter(subject: string, paragraphs: readonly string[]): LetterText {
  return { subject: oneLine(subject), bodyText: paragraphs.filter(paragraph => paragraph.trim() !== '').map(wrapped).join('\n\n') + '\n' }
}

/** Names and reasons come from people: no line break of theirs reaches a heading. */
function oneLine(text: string): string {
  // eslint-disable-next-line no-control-regex -- control characters are exactly what must go
  return text.replace(/[\u0000-\u001f\u007f\u2028\u2029]+/g, ' ').replace(/ {2,}/g, ' ').trim()
}

function wrapped(paragraph: string): string {
  return paragraph.split(/\r\n|\r|\n/).map(wrappedLine).join('\n')
}

function wrappedLine(text: string): string {
  const lines: string[] = []
  let line = ''
  for (const word of text.split(/\s+/)) {
    if (line !== '' && line.length + 1 + word.length > LINE_WIDTH) {
      lines.push(line)
      line = word
    }
    else {
      line = line === '' ? word : `${line} ${word}`
    }
  }
  return [...lines, line].join('\n')
}
