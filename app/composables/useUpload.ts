import { UPLOAD_CAP_BYTES } from '#shared/schemas/batches'
import type { BatchView } from '#shared/schemas/batches'
import { formatFileSize } from '#shared/units/file-size'
import type { Kind } from '~~/fitting/types'
import { ApiError, readTrouble } from './useApi'

export interface Upload {
  body: Blob
  fileName: string
  kind: Kind
  targetId: string | null
}

const TYPES: Record<string, string> = { csv: 'text/csv', txt: 'text/csv', dat: 'text/csv', tsv: 'text/tab-separated-values', tab: 'text/tab-separated-values' }

/** The media type that a file is sent as, by the end of its name. */
export function mediaTypeOf(fileName: string): string {
  return TYPES[fileName.split('.').pop()?.toLowerCase() ?? ''] ?? 'application/octet-stream'
}

/** Throws, before anything is sent, for what the server would refuse by size alone. */
export function checkSize(body: Blob): void {
  if (body.size === 0) {
    throw new ApiError({ code: 'file-unreadable', status: 422, title: 'The file is empty', detail: 'It has no bytes in it. Choose the file that holds your measures.', fields: [] })
  }
  if (body.size > UPLOAD_CAP_BYTES) {
    const detail = `It has ${formatFileSize(body.size)}, and ${formatFileSize(UPLOAD_CAP_BYTES)} are taken at once. Split it into parts; measures that come twice are not doubled.`
    throw new ApiError({ code: 'body-too-large', status: 413, title: 'The file is too large', detail, fields: [] })
  }
}

/**
 * Sends one file's bytes as they are and says how far it has come (0 to 1). XMLHttpRequest, because fetch reports no
 * progress of what it sends.
 */
export function useUpload() {
  const fraction = ref<number | null>(null)

  function send({ body, fileName, kind, targetId }: Upload): Promise<BatchView> {
    checkSize(body)
    const query = new URLSearchParams({ fileName, kind, ...(targetId && { targetId }) })
    return new Promise((resolve, reject) => {
      const request = new XMLHttpRequest()
      request.open('POST', `/api/v1/batches?${query}`)
      request.setRequestHeader('content-type', mediaTypeOf(fileName))
      request.upload.onprogress = (event) => { fraction.value = event.lengthComputable ? event.loaded / event.total : null }
      request.onerror = () => reject(new ApiError(readTrouble(undefined, null)))
      request.onload = () => {
        const answer = parseJson(request.responseText)
        if (request.status === 201) resolve(answer as BatchView)
        else reject(new ApiError(readTrouble(request.status, answer)))
      }
      request.onloadend = () => { fraction.value = null }
      fraction.value = 0
      request.send(body)
    })
  }

  return { fraction, send }
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch (error) {
    // A proxy in between may answer in HTML; readTrouble then goes by the status.
    if (error instanceof SyntaxError) return null
    throw error
  }
}
