import { getRequestHeader } from 'h3'
import type { H3Event } from 'h3'
import { AppError } from '../errors/app-error'
import { BodyCutShort, collectBody } from './collect-body'

/** Largest JSON body that is read, bytes. */
export const JSON_CAP_BYTES = 1024 * 1024

/** Reads the body as JSON: its type must say so, and its bytes are counted as they come, whatever Content-Length claims. */
export async function readJsonBody(event: H3Event): Promise<unknown> {
  const type = (getRequestHeader(event, 'content-type') ?? '').split(';')[0]!.trim().toLowerCase()
  if (type !== 'application/json') {
    throw new AppError('body-not-json', `The body came as "${type || 'no type'}". Send JSON with the header Content-Type: application/json.`)
  }
  const bytes = await collectBody(event.node.req, { capBytes: JSON_CAP_BYTES }).catch((error: unknown) => {
    throw error instanceof BodyCutShort ? malformed(error) : error
  })
  if (!bytes) throw new AppError('body-too-large', `The body is larger than ${JSON_CAP_BYTES / 1024 / 1024} MB. Send less at once.`)
  const text = decodeUtf8(bytes)
  try {
    return JSON.parse(text)
  }
  catch (cause) {
    throw malformed(cause)
  }
}

function decodeUtf8(bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  }
  catch (cause) {
    throw malformed(cause)
  }
}

function malformed(cause: unknown): AppError {
  return new AppError('body-malformed', 'The body cannot be read as JSON in UTF-8. Check its quotes, commas and brackets.', { cause })
}
