import { z } from 'zod'
import { idSchema } from '#shared/schemas/ids'

/** Computes a fit that stands in the table as queued. */
export const runFitSchema = z.object({ fitId: idSchema })
