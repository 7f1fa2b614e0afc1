import { getRequestHeader, getRequestWebStream } from 'h3'
import type { H3Event } from 'h3'
import { AppError } from '../errors/app-error'

/** Largest JSON body that is read, bytes. */
export const JSON_CAP_BYTES = 1024 * 1024

/** Reads the body as JSON: its type must say so, and its bytes are counted as they come, whatever Content-Length claims. */
export async function readJsonBody(event: H3Event): Promise<unknown> {
  const type = (getRequestHeader(event, 'content-type') ?? '').split(';')[0]!.trim().toLowerCase()
  if (type !== 'application/json') {
    throw new AppError('body-not-json', `The body came as "${type || 'no type'}". Send JSON with the header Content-Type: application/json.`)
  }
  const text = decodeUtf8(await readCounted(event))
  try {
    return JSON.parse(text)
  }
  catch (cause) {
    throw malformed(cause)
  }
}

async function readCounted(event: H3Event): Promise<Uint8Array> {
  if (Number(getRequestHeader(event, 'content-length') ?? 0) > JSON_CAP_BYTES) throw tooLarge()
  const stream = getRequestWebStream(event)
  const chunks: Uint8Array[] = []
  let byteCount = 0
  if (stream) {
    for await (const chunk of stream as unknown as AsyncIterable<Uint8Array | string>) {
      const bytes = typeof chunk === 'string' ? Buffer.from(chunk) : chunk
      byteCount += bytes.byteLength
      if (byteCount > JSON_CAP_BYTES) throw tooLarge()
      chunks.push(bytes)
    }
  }
  return Buffer.concat(chunks)
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

function tooLarge(): AppError {
  return new AppError('body-too-large', `The body is larger than ${JSON_CAP_BYTES / 1024 / 1024} MB. Send less at once.`)
}
