import { z } from 'zod'
import { idSchema } from '#shared/schemas/ids'

/** Sends one letter of the outbox. */
export const sendMailSchema = z.object({ mailId: idSchema })
