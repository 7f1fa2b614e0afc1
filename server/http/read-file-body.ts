import { createHash } from 'node:crypto'
import { getRequestHeader } from 'h3'
import type { H3Event } from 'h3'
import { AppError } from '../errors/app-error'
import { BodyCutShort, collectBody } from './collect-body'

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

/**
 * Reads a file that is sent as the body itself. Its bytes are counted as they come, whatever Content-Length claims.
 * Throws file-type-unsupported for forms and other types, body-too-large above the cap.
 */
export async function readFileBody(event: H3Event, { types, capBytes }: FileRules): Promise<FileBody> {
  const type = (getRequestHeader(event, 'content-type') ?? '').split(';')[0]!.trim().toLowerCase()
  if (!types.includes(type)) {
    throw new AppError('file-type-unsupported', `The body came as "${type || 'no type'}". Send the file's bytes themselves, with one of the types ${types.join(', ')}; a form is not taken.`)
  }
  const hash = createHash('sha256')
  const bytes = await collectBody(event.node.req, { capBytes, onPart: part => hash.update(part) }).catch(refuseCutShort)
  if (!bytes) throw new AppError('body-too-large', `The file is larger than ${capBytes / 1024 / 1024} MB. Split it into several files and upload them one after the other; nothing was written.`)
  return { bytes, sha256: hash.digest('hex') }
}

function refuseCutShort(error: unknown): never {
  if (!(error instanceof BodyCutShort)) throw error
  throw new AppError('file-unreadable', `${error.message} Send the file again; nothing was written.`)
}
