import { describe, expect, it } from 'vitest'
import { editionPublishedMail } from '../../../../../server/mail/templates/edition-published.mail'
import { fitWaitingMail } from '../../../../../server/mail/templates/fit-waiting.mail'
import { letter } from '../../../../../server/mail/templates/letter'
import { rulingMadeMail } from '../../../../../server/mail/templates/ruling-made.mail'

const edition = {
  targetName: 'Linden 12 AB', programmeName: 'Northern pairs', number: 2, supersedes: 1, summary: 'P 62.41 ± 0.38 yr, e 0.482, a 0.861″',
  whatChanged: 'Nine measures of 2026 joined.', ownMeasures: 9, editionUrl: 'https://orbits.example.org/orbits/abc/2',
}

describe('letter', () => {
  it('lets no line break into a subject', () => {
    expect(letter('Linden 12\r\nBcc: all@example.org', []).subject).toBe('Linden 12 Bcc: all@example.org')
  })

  it('keeps lines short and addresses whole', () => {
    const url = `https://orbits.example.org/${'a'.repeat(90)}`
    const lines = letter('S', [`${'word '.repeat(60)}${url}`]).bodyText.split('\n')
    expect(lines).toContain(url)
    for (const line of lines.filter(text => text !== url)) expect(line.length).toBeLessThanOrEqual(72)
  })

  it('leaves no hole for a paragraph that is empty', () => {
    expect(letter('S', ['One.', '', 'Two.']).bodyText).toBe('One.\n\nTwo.\n')
  })
})

describe('the letter about an edition', () => {
  it('says what is published, what it replaces, what changed, what the reader gave and where to read it', () => {
    const { subject, bodyText } = editionPublishedMail(edition)
    expect(subject).toBe('Linden 12 AB: edition 2 is published')
    for (const part of ['supersedes edition 1', edition.summary, edition.whatChanged, '9 of the measures in it are yours', edition.editionUrl]) {
      expect(bodyText.replace(/\n/g, ' ')).toContain(part)
    }
  })

  it('speaks neither of a predecessor nor of own measures where there are none', () => {
    const { bodyText } = editionPublishedMail({ ...edition, number: 1, supersedes: null, ownMeasures: 0, whatChanged: '' })
    expect(bodyText).not.toMatch(/supersedes|yours|What changed/)
  })
})

describe('the letter about a ruling', () => {
  it('gives the reason and what to do next, for each decision', () => {
    const ruling = { targetName: 'Hazel 3 AB', batchNumber: 4, fileName: 'hazel.csv', reason: 'θ of row 3 is a mistyped 11', batchUrl: 'https://orbits.example.org/uploads/b' }
    expect(rulingMadeMail({ ...ruling, decision: 'return' }).bodyText).toMatch(/returned to you[\s\S]*mistyped 11[\s\S]*send them once\s+more[\s\S]*uploads\/b/)
    expect(rulingMadeMail({ ...ruling, decision: 'accept' }).subject).toBe('Hazel 3 AB: batch 4 was accepted')
    expect(rulingMadeMail({ ...ruling, decision: 'decline' }).bodyText).toContain('no fit uses them')
  })
})

describe('the letter about a fit that waits', () => {
  it('tells a fit that waits for a ruling from one that could not be made', () => {
    const fit = { targetName: 'Linden 7 AB', programmeName: 'Northern pairs', fitNumber: 3, newMeasures: 1, headline: 'Ellipse, bound by construction', hasFailed: false, fitUrl: 'https://orbits.example.org/targets/t?fit=f' }
    expect(fitWaitingMail(fit).bodyText.replace(/\n/g, ' ')).toContain('with one new measure, waits for a ruling')
    expect(fitWaitingMail({ ...fit, hasFailed: true }).bodyText).toContain('could not be made')
  })
})
