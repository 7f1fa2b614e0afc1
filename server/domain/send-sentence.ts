import { counted } from './wording'

export interface SendCounts {
  sent: number
  alreadyHere: number
  keptAsDraft: number
}

/** What became of a batch that was sent, e.g. "12 new measures sent. 3 were already here. 1 row is kept as a draft." */
export function sendSentence({ sent, alreadyHere, keptAsDraft }: SendCounts): string {
  const parts = [`${counted(sent, 'new measure')} sent.`]
  if (alreadyHere) parts.push(`${alreadyHere} ${alreadyHere === 1 ? 'was' : 'were'} already here.`)
  if (keptAsDraft) parts.push(`${counted(keptAsDraft, 'row')} ${keptAsDraft === 1 ? 'is' : 'are'} kept as a draft.`)
  return parts.join(' ')
}

/** The answer to sending a batch in which nothing is new: "0 new, 50 already here." */
export function nothingNewSentence({ alreadyHere, keptAsDraft }: SendCounts): string {
  const here = `0 new, ${alreadyHere} already here.`
  if (!keptAsDraft) return `${here} The same measures add nothing; send a file that holds something new.`
  return keptAsDraft === 1
    ? `${here} One row cannot be sent as it stands: mend it, or choose its target, and send again.`
    : `${here} ${keptAsDraft} rows cannot be sent as they stand: mend them, or choose their target, and send again.`
}
