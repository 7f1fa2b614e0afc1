import { expect, test } from 'vitest'
import { createAttemptLimiter, WINDOW_MS } from '../../../../server/services/people/attempt-limiter'
import { createFakeClock } from '../../../builders/fake-clock'

const clock = createFakeClock('2026-12-01T20:00:00.000Z')
const code = (call: () => void) => {
  try {
    call()
    return null
  }
  catch (error) {
    return (error as { code: string }).code
  }
}

test('attempts that succeed do not use a window up, those that fail do, key by key', () => {
  const limiter = createAttemptLimiter({ maxFailures: 2 })
  for (let attempt = 0; attempt < 10; attempt++) {
    limiter.begin('a', clock)
    limiter.succeeded('a')
  }
  limiter.begin('a', clock)
  limiter.begin('a', clock)
  expect(code(() => limiter.begin('a', clock))).toBe('too-many-attempts')
  expect(code(() => limiter.begin('b', clock))).toBeNull()
})

test('a window ends after its time', () => {
  const limiter = createAttemptLimiter({ maxFailures: 1 })
  limiter.begin('a', clock)
  clock.advance(WINDOW_MS - 1)
  expect(code(() => limiter.begin('a', clock))).toBe('too-many-attempts')
  clock.advance(1)
  expect(code(() => limiter.begin('a', clock))).toBeNull()
})

test('beyond its keys the oldest is forgotten, so that memory stays bounded', () => {
  const limiter = createAttemptLimiter({ maxFailures: 1, maxKeys: 2 })
  for (const key of ['a', 'b', 'c']) limiter.begin(key, clock)
  expect(code(() => limiter.begin('c', clock))).toBe('too-many-attempts')
  expect(code(() => limiter.begin('a', clock))).toBeNull()
})
