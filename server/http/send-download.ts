import { getRequestHeader, setResponseHeaders, setResponseStatus } from 'h3'
import type { H3Event } from 'h3'

/** A published file that never changes at its address. */
export interface PublishedFile {
  text: string
  mediaType: string
  fileName: string
  /** SHA-256 of the text's bytes. */
  sha256: string
  /** The page by which it is cited (RFC 8574). */
  citeAs: string
}

const LICENCE = 'https://creativecommons.org/licenses/by/4.0/'
const CACHE = 'public, max-age=31536000, immutable'

/** Answers a published file, or 304 where the reader has it; licence and citation go along as links (RFC 8288). */
export function sendDownload(event: H3Event, file: PublishedFile): string | null {
  const etag = `"${file.sha256}"`
  setResponseHeaders(event, { 'Cache-Control': CACHE, 'ETag': etag })
  if (isKnown(getRequestHeader(event, 'if-none-match'), etag)) {
    setResponseStatus(event, 304)
    return null
  }
  setResponseHeaders(event, {
    'Content-Type': file.mediaType,
    'Content-Disposition': `attachment; filename="${file.fileName}"`,
    'X-Content-Type-Options': 'nosniff',
    'Link': `<${LICENCE}>; rel="license", <${file.citeAs}>; rel="cite-as"`,
  })
  return file.text
}

function isKnown(header: string | undefined, etag: string): boolean {
  return header !== undefined && header.split(',').some(known => known.trim().replace(/^W\//, '') === etag || known.trim() === '*')
}
