import { expect, test } from 'vitest'
import { base32, makeIds } from '../../../../server/context/ids'
import { idSchema } from '../../../../shared/schemas/ids'

// RFC 4648, section 10, test vectors for base 32, in small letters and without padding.
test.each([['', ''], ['f', 'my'], ['fo', 'mzxq'], ['foo', 'mzxw6'], ['foob', 'mzxw6yq'], ['fooba', 'mzxw6ytb'], ['foobar', 'mzxw6ytboi']])('%j is %s in base 32', (text, expected) => {
  expect(base32(Buffer.from(text))).toBe(expected)
})

test('ids are 26 letters that the schema takes, tokens are 52, and none comes twice', () => {
  const { newId, newToken } = makeIds()
  const ids = Array.from({ length: 1000 }, newId)
  for (const id of ids) expect(idSchema.safeParse(id).success).toBe(true)
  expect(new Set(ids).size).toBe(1000)
  expect(newToken()).toMatch(/^[a-z2-7]{52}$/)
})
