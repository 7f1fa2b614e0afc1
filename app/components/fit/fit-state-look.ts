import type { FitState } from '#shared/schemas/fits'

type Tone = 'plain' | 'orbit' | 'mark' | 'good' | 'hold' | 'stop'

/** How each state of a fit is called and marked, everywhere. */
export const FIT_STATE_LOOK: Record<FitState, { text: string, tone: Tone }> = {
  queued: { text: 'in the queue', tone: 'hold' },
  running: { text: 'being computed', tone: 'hold' },
  done: { text: 'waits for a ruling', tone: 'mark' },
  failed: { text: 'no fit', tone: 'stop' },
  accepted: { text: 'accepted', tone: 'good' },
  declined: { text: 'declined', tone: 'stop' },
  superseded: { text: 'superseded', tone: 'plain' },
  published: { text: 'published', tone: 'good' },
}

/** What the engine is at, for people who wait. */
export const STAGE_TEXT: Record<string, string> = {
  reading: 'reading the measures',
  searching: 'searching for the orbit',
  polishing: 'refining it',
  judging: 'working out errors and alternatives',
}
