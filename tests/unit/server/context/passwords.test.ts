import { expect, test } from 'vitest'
import { createPasswords, SCRYPT_COST } from '../../../../server/context/passwords'

const passwords = createPasswords({ logN: 4, r: 8, p: 1 })

test('a password matches its own hash and no other does', async () => {
  const hash = await passwords.hash('a long enough password')
  expect(await passwords.matches('a long enough password', hash)).toBe(true)
  expect(await passwords.matches('a long enough passwore', hash)).toBe(false)
  expect(await passwords.matches('anything', null)).toBe(false)
})

test('the same password has another hash each time', async () => {
  expect(await passwords.hash('the same')).not.toBe(await passwords.hash('the same'))
})

test('a hash made at another cost still matches', async () => {
  const hash = await createPasswords({ logN: 5, r: 8, p: 2 }).hash('older cost')
  expect(hash).toMatch(/^\$scrypt\$ln=5,r=8,p=2\$/)
  expect(await passwords.matches('older cost', hash)).toBe(true)
})

test('letters composed on another keyboard are the same password', async () => {
  expect(await passwords.matches('cafe\u0301 au lait', await passwords.hash('caf\u00e9 au lait'))).toBe(true)
})

test('a stored value that is no hash is refused aloud', async () => {
  await expect(passwords.matches('x', 'plain text')).rejects.toThrow(/scrypt/)
})

test('the cost in force is the one OWASP gives', async () => {
  expect(SCRYPT_COST).toEqual({ logN: 15, r: 8, p: 3 })
  expect(await createPasswords().hash('x')).toMatch(/^\$scrypt\$ln=15,r=8,p=3\$/)
})
