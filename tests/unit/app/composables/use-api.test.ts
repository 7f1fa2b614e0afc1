import { describe, expect, it } from 'vitest'
import { ApiError, readTrouble, troubleOf } from '../../../../app/composables/useApi'

describe('what a failed call says', () => {
  it("the server's own words are passed on with their fields", () => {
    const problem = { type: 'about:blank', title: 'Something failed', status: 422, code: 'input-invalid', detail: 'θ is 361.', fields: [{ path: 'cells', reason: 'outside 0 to 360' }] }
    expect(readTrouble(422, problem)).toEqual({ code: 'input-invalid', status: 422, title: 'Something failed', detail: 'θ is 361.', fields: [{ path: 'cells', reason: 'outside 0 to 360' }] })
  })

  it('no answer at all is said to be that, and what to do', () => {
    expect(readTrouble(undefined, undefined)).toMatchObject({ code: 'no-answer', detail: expect.stringContaining('try again') })
  })

  it('an answer of something in between (a page of HTML) does not pass for a problem', () => {
    expect(readTrouble(502, '<html>')).toMatchObject({ code: 'internal', status: 502, title: 'The server answered 502' })
  })

  it('a code that is not on the closed list does not pass for a problem', () => {
    expect(readTrouble(400, { code: 'made-up', detail: 'x' })).toMatchObject({ code: 'internal' })
  })
})

describe('the trouble behind an error', () => {
  const trouble = readTrouble(undefined, null)

  it('is found in an ApiError and in what Nuxt made of one on its way to the browser', () => {
    expect(troubleOf(new ApiError(trouble))).toEqual(trouble)
    expect(troubleOf({ statusCode: 503, data: trouble })).toEqual(trouble)
  })

  it("is not made up for a programmer's error", () => {
    expect(troubleOf(new TypeError('x is undefined'))).toBeNull()
    expect(troubleOf(null)).toBeNull()
  })
})
