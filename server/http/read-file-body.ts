import { createHash } from 'node:crypto'
import type { IncomingMessage } from 'node:http'
import { getRequestHeader } from 'h3'
import type { H3Event } from 'h3'
import { AppError } from '../errors/app-error'

export interface FileBody {
  bytes: Buffer
  /** Of the bytes, 64 hexadecimal digits. */
  sha256: string
}

export interface FileRules {
  /** Media types that are taken, in small letters. */
  types: readonly string[]
  capBytes: number
}

/** How many times the cap is read at most before the refusal is answered. */
const DRAIN_FACTOR = 8

/**
 * Reads a file that is sent as the body itself. Its bytes are counted as they come, whatever Content-Length claims.
 * Throws file-type-unsupported for forms and other types, body-too-large above the cap.
 */
export async function readFileBody(event: H3Event, { types, capBytes }: FileRules): Promise<FileBody> {
  const type = (getRequestHeader(event, 'content-type') ?? '').split(';')[0]!.trim().toLowerCase()
  if (!types.includes(type)) {
    throw new AppError('file-type-unsupported', `The body came as "${type || 'no type'}". Send the file's bytes themselves, with one of the types ${types.join(', ')}; a form is not taken.`)
  }
  const body = await collect(event.node.req, capBytes)
  if (!body) throw new AppError('body-too-large', `The file is larger than ${capBytes / 1024 / 1024} MB. Split it into several files and upload them one after the other; nothing was written.`)
  return body
}

/**
 * The body with its hash; null where it is larger than the cap. Reading goes on beyond it for a while, only to throw away: a client that is still sending would
 * otherwise see its connection broken instead of the refusal.
 */
function collect(req: IncomingMessage, capBytes: number): Promise<FileBody | null> {
  return new Promise((resolve, reject) => {
    const hash = createHash('sha256')
    const chunks: Buffer[] = []
    let byteCount = 0
    const settle = (finish: () => void) => {
      req.off('data', take).off('end', end).off('close', close).off('error', close)
      finish()
    }
    const take = (chunk: Buffer) => {
      byteCount += chunk.byteLength
      if (byteCount > capBytes) {
        chunks.length = 0
        if (byteCount > capBytes * DRAIN_FACTOR) settle(() => resolve(null))
        return
      }
      hash.update(chunk)
      chunks.push(chunk)
    }
    const end = () => settle(() => resolve(byteCount > capBytes ? null : { bytes: Buffer.concat(chunks), sha256: hash.digest('hex') }))
    // A connection that broke in the middle must not pass half a file off as a whole one.
    const close = () => settle(() => reject(new AppError('file-unreadable', 'The connection ended before the whole file was here. Send it again; nothing was written.')))
    req.on('data', take).on('end', end).on('close', close).on('error', close)
  })
}
