import type { BatchState, BatchSummary } from '#shared/schemas/batches'
import { formatCount } from '#shared/units/date-text'

type Tone = 'plain' | 'orbit' | 'mark' | 'good' | 'hold' | 'stop'

/** How each state of a batch's part is called and marked. */
export const PART_LOOK: Record<BatchState, { text: string, tone: Tone }> = {
  draft: { text: 'draft', tone: 'plain' },
  sent: { text: 'sent, waits for a ruling', tone: 'hold' },
  accepted: { text: 'accepted', tone: 'good' },
  returned: { text: 'returned to you', tone: 'mark' },
  declined: { text: 'declined', tone: 'stop' },
  withdrawn: { text: 'withdrawn', tone: 'plain' },
}

type Counts = Pick<BatchSummary, 'rows' | 'good' | 'bad' | 'alreadyHere' | 'sent'>

/** The counts of a batch in words, the ones that are not zero. */
export function countsSentence({ rows, good, bad, alreadyHere, sent }: Counts): string {
  const parts = [
    sent > 0 && `${sent} sent`,
    good > 0 && `${good} ready to send`,
    bad > 0 && `${bad} to mend`,
    alreadyHere > 0 && `${alreadyHere} already here`,
  ].filter(Boolean)
  return [formatCount(rows, 'row'), ...parts].join(' · ')
}

/** What the button says that sends a batch. */
export function sendLabel({ good, alreadyHere }: Pick<Counts, 'good' | 'alreadyHere'>): string {
  if (good > 0) return `Send ${formatCount(good, 'new measure')}`
  return alreadyHere > 0 ? `0 new, ${alreadyHere} already here` : 'Nothing to send yet'
}

/** Whether a batch still holds something of its owner's to decide: rows to send or mend, or a file in which nothing is new. */
export function isOpenDraft({ good, bad, sent }: Pick<Counts, 'good' | 'bad' | 'sent'>): boolean {
  return good + bad > 0 || sent === 0
}

export const BATCH_STEPS = ['Read', 'Mend', 'Send', 'Ruling'] as const

/** Where a batch stands among BATCH_STEPS. */
export function currentStep(counts: Pick<Counts, 'good' | 'bad' | 'sent'>): number {
  if (counts.bad > 0) return BATCH_STEPS.indexOf('Mend')
  return BATCH_STEPS.indexOf(isOpenDraft(counts) ? 'Send' : 'Ruling')
}
