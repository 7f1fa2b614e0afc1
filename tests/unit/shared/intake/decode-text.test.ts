import { describe, expect, it } from 'vitest'
import { decodeText } from '../../../../shared/intake/decode-text'

const bytes = (...parts: (string | number[])[]) => Uint8Array.from(parts.flatMap(part => (typeof part === 'string' ? [...Buffer.from(part, 'utf8')] : part)))
const utf16 = (text: string) => [...Buffer.from(text, 'utf16le')]
const swapped = (pairs: number[]) => pairs.map((_, i) => pairs[i ^ 1]!)

describe('the text of a file', () => {
  it.each([
    ['UTF-8', bytes('epoch,θ\n')],
    ['UTF-8 with a byte order mark', bytes([0xEF, 0xBB, 0xBF], 'epoch,θ\n')],
    ['UTF-16 with a byte order mark', bytes([0xFF, 0xFE], utf16('epoch,θ\n'))],
    ['UTF-16 with the other byte order', bytes([0xFE, 0xFF], swapped(utf16('epoch,θ\n')))],
    ['UTF-16 without a mark', bytes(utf16('epoch,θ\n'))],
    ['UTF-16 without a mark, other order', bytes(swapped(utf16('epoch,θ\n')))],
  ])('is found in %s', (_encoding, input) => {
    expect(decodeText(input)).toMatchObject({ ok: true, text: 'epoch,θ\n', note: null })
  })

  it('in another encoding is read as Windows-1252 and said to be an assumption', () => {
    const read = decodeText(bytes('observer\nJ', [0xF6], 'rn\n'))
    expect(read).toMatchObject({ ok: true, text: 'observer\nJörn\n', encoding: 'Windows-1252', note: { severity: 'note', reason: expect.stringContaining('assumption') } })
  })

  it.each([
    ['a zipped spreadsheet', bytes([0x50, 0x4B, 3, 4], 'xl/workbook'), 'spreadsheet'],
    ['an old spreadsheet', bytes([0xD0, 0xCF, 0x11, 0xE0, 1, 2]), 'spreadsheet'],
    ['a PDF', bytes('%PDF-1.7\n'), 'PDF'],
    ['a picture', bytes([0x89, 0x50, 0x4E, 0x47, 13, 10]), 'picture'],
    ['bytes with NULs', bytes('epoch', [0], 'theta'), 'U+0000'],
    ['UTF-32', bytes([0xFF, 0xFE, 0, 0, 0x61, 0, 0, 0]), 'UTF-32'],
    ['broken UTF-8 behind its mark', bytes([0xEF, 0xBB, 0xBF, 0xC3, 0x28]), 'UTF-8'],
    ['half a UTF-16 letter', bytes([0xFF, 0xFE, 0x00, 0xD8]), 'UTF-16LE'],
    ['nothing at all', bytes(), 'empty'],
  ])('is refused where there is none: %s', (_what, input, named) => {
    const read = decodeText(input)
    expect(read.ok).toBe(false)
    if (!read.ok) expect(read.problem).toMatchObject({ severity: 'error', reason: expect.stringContaining(named), remedy: expect.stringMatching(/\w/) })
  })
})
