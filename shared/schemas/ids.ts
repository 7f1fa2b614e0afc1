import { z } from 'zod'

/** 128 random bits as 26 base-32 letters (a–z, 2–7). */
export const idSchema = z.string().regex(/^[a-z2-7]{26}$/, 'an id of 26 letters a–z or digits 2–7')
export type Id = z.infer<typeof idSchema>
export const idParamsSchema = z.object({ id: idSchema })
/** For actions that need no word beyond their address. */
export const emptyBodySchema = z.object({})

export interface Page<Item> {
  items: Item[]
  nextCursor: string | null
}

export const pageQuerySchema = z.object({
  cursor: z.string().max(1000).optional(),
  limit: z.string().regex(/^\d{1,3}$/, 'a whole number').transform(Number).pipe(z.number().int().min(1).max(200)).optional(),
})
