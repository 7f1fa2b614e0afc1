import { z } from 'zod'
import { idSchema } from './ids'

export const emailSchema = z.email('an e-mail address such as name@example.org').max(254).transform(s => s.toLowerCase())
/** NIST SP 800-63B: length decides, no composition rules. */
export const passwordSchema = z.string().min(10, 'at least 10 characters').max(200, 'at most 200 characters')
export const displayNameSchema = z.string().trim().min(1, 'a name').max(120, 'at most 120 characters')

export const signInSchema = z.object({ email: emailSchema, password: z.string().min(1, 'the password').max(200) })
export const acceptInvitationSchema = z.object({ email: emailSchema, displayName: displayNameSchema, password: passwordSchema })
export const inviteSchema = z.object({
  email: emailSchema.optional(),
  isObserver: z.boolean().default(true),
  isAdministrator: z.boolean().default(false),
  coordinatorOf: idSchema.nullish(),
})
export const changeRolesSchema = z.object({
  isObserver: z.boolean(),
  isAdministrator: z.boolean(),
  coordinatorOf: z.array(idSchema).max(200),
})
export const changeNameSchema = z.object({ displayName: displayNameSchema })
/** The secret of an invitation's link. */
export const invitationParamsSchema = z.object({ token: z.string().min(1).max(200) })
export const changePasswordSchema = z.object({ currentPassword: z.string().min(1), newPassword: passwordSchema })

/** The signed-in person as policies see them; null stands for a visitor. */
export interface Actor {
  personId: string
  isObserver: boolean
  isAdministrator: boolean
  /** Programmes coordinated. */
  coordinatorOf: string[]
}

export interface Me extends Actor {
  displayName: string
  email: string
  /** Things waiting on the desk; 0 for those without a desk. */
  deskCount: number
}

export interface PersonView {
  id: string
  displayName: string
  email: string
  isObserver: boolean
  isAdministrator: boolean
  coordinatorOf: string[]
  state: 'active' | 'closed'
  createdAt: string
}

export interface InvitationView {
  id: string
  email: string | null
  isObserver: boolean
  isAdministrator: boolean
  coordinatorOf: string | null
  createdAt: string
  expiresAt: string
  usedAt: string | null
}
/** Answered once, to the one who made it. */
export interface NewInvitation extends InvitationView { url: string }
