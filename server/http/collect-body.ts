import type { IncomingMessage } from 'node:http'

/** How many times the cap is read at most before the refusal is answered. */
const DRAIN_FACTOR = 8

/** The connection ended before the whole body was here. */
export class BodyCutShort extends Error {
  constructor() {
    super('The connection ended before the whole body was here.')
    this.name = 'BodyCutShort'
  }
}

export interface CollectOptions {
  capBytes: number
  /** Sees each part as it comes, for a hash. */
  onPart?: (part: Buffer) => void
}

/**
 * The body, its bytes counted as they come, whatever Content-Length claims; null where it is larger than the cap. Reading goes on
 * beyond the cap for a while, only to throw away: a client that is still sending would otherwise see its connection broken
 * instead of the refusal. Throws BodyCutShort, so that half a body never passes for a whole one.
 */
export function collectBody(req: IncomingMessage, { capBytes, onPart }: CollectOptions): Promise<Buffer | null> {
  return new Promise((resolve, reject) => {
    const parts: Buffer[] = []
    let byteCount = 0
    const settle = (finish: () => void) => {
      req.off('data', take).off('end', end).off('close', cut).off('error', cut)
      finish()
    }
    const take = (part: Buffer) => {
      byteCount += part.byteLength
      if (byteCount > capBytes) {
        parts.length = 0
        if (byteCount > capBytes * DRAIN_FACTOR) settle(() => resolve(null))
        return
      }
      onPart?.(part)
      parts.push(part)
    }
    const end = () => settle(() => resolve(byteCount > capBytes ? null : Buffer.concat(parts)))
    const cut = () => settle(() => reject(new BodyCutShort()))
    req.on('data', take).on('end', end).on('close', cut).on('error', cut)
    if (req.destroyed) cut() // gone before anybody listened: no event will come
  })
}
