import { describe, expect, it } from 'vitest'
import { checkSize, mediaTypeOf } from '../../../../app/composables/useUpload'
import { UPLOAD_CAP_BYTES } from '../../../../shared/schemas/batches'

describe('before a file is sent', () => {
  it.each([['nights.CSV', 'text/csv'], ['nights.tsv', 'text/tab-separated-values'], ['nights.xlsx', 'application/octet-stream'], ['nights', 'application/octet-stream']])(
    '%s goes as %s', (name, type) => expect(mediaTypeOf(name)).toBe(type),
  )

  it('an empty file is refused here', () => {
    expect(() => checkSize(new Blob([]))).toThrow('The file is empty')
  })

  it('a file of just the cap may go, and one byte more is refused with its size', () => {
    expect(() => checkSize(new Blob([new Uint8Array(UPLOAD_CAP_BYTES)]))).not.toThrow()
    expect(() => checkSize(new Blob([new Uint8Array(UPLOAD_CAP_BYTES + 1)]))).toThrow('It has 8.4 MB, and 8.4 MB are taken at once')
  })
})
