import { setResponseHeaders } from 'h3'
import type { H3Event } from 'h3'

/** Answers bytes of somebody's making as a file to keep, never as a page to show: no type of theirs is believed. */
export function sendAttachment(event: H3Event, file: { bytes: Buffer; fileName: string }): Buffer {
  setResponseHeaders(event, {
    'Content-Type': 'application/octet-stream',
    'Content-Disposition': `attachment; filename="${asciiName(file.fileName)}"; filename*=UTF-8''${rfc5987(file.fileName)}`,
    'X-Content-Type-Options': 'nosniff',
    'Content-Security-Policy': 'sandbox',
  })
  return file.bytes
}

function asciiName(name: string): string {
  return name.replace(/[^A-Za-z0-9._ -]/g, '_')
}

/** RFC 5987: encodeURIComponent leaves ' ( ) * alone, which the header may not hold. */
function rfc5987(name: string): string {
  return encodeURIComponent(name.toWellFormed()).replace(/['()*]/g, letter => `%${letter.charCodeAt(0).toString(16).toUpperCase()}`)
}
