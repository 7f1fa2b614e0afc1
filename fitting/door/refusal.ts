/** Refusals: a request that cannot be fitted, in words, with what would help. Thrown inside the door only, never out of it. */
import type { Refusal, RefusalCode } from '../types'

/** Carries a refusal from where it is found to the door, which returns it. */
export class RefusedRequest extends Error {
  readonly refusal: Refusal

  constructor(code: RefusalCode, sentence: string, remedy: string) {
    super(sentence)
    this.name = 'RefusedRequest'
    this.refusal = { code, sentence, remedy }
  }
}

/**
 * Refuses a request.
 * @param code from the closed list.
 * @param sentence what is wrong and where.
 * @param remedy what would help.
 * @throws RefusedRequest always.
 */
export function refuse(code: RefusalCode, sentence: string, remedy: string): never {
  throw new RefusedRequest(code, sentence, remedy)
}
