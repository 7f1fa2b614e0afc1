import { createHash } from 'node:crypto'

/** How secrets of links are kept: whoever reads the database cannot use them. They have 256 random bits, so no salt is needed. */
export function secretHash(token: string): string {
  return createHash('sha256').update(token).digest('hex')
}
