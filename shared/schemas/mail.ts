import { z } from 'zod'

export const MAIL_STOP_SCOPES = ['target', 'all'] as const
/** The secret of a link at the end of a letter: 52 base-32 letters. */
export const mailStopAddressSchema = z.object({ token: z.string().regex(/^[a-z2-7]{52}$/, 'a link from the end of a letter') })
export const stopMailSchema = z.object({ scope: z.enum(MAIL_STOP_SCOPES) })

/** What the link at the end of a letter can stop, and what is stopped already; names no person. */
export interface MailStopView {
  /** null for a letter that is about no target. */
  targetName: string | null
  isTargetStopped: boolean
  isAllStopped: boolean
  /** The state in words. */
  sentence: string
}
