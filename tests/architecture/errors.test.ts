import { describe, expect, it } from 'vitest'
import { toProblem } from '../../server/errors/to-problem'
import { AppError } from '../../server/errors/app-error'
import { PROBLEMS, type ProblemCode } from '../../shared/errors/problem-codes'
import { readSources } from './source-files'

const codes = Object.keys(PROBLEMS) as ProblemCode[]

describe('every error code', () => {
  it('has a status of failure and a title that is a sentence', () => {
    for (const code of codes) {
      expect(code).toMatch(/^[a-z]+(?:-[a-z]+)*$/)
      expect(PROBLEMS[code].status).toBeGreaterThanOrEqual(400)
      expect(PROBLEMS[code].status).toBeLessThan(600)
      expect(PROBLEMS[code].title).toMatch(/^[A-Z].{5,}[^.]$/)
    }
  })

  it('is answered as RFC 9457 problem details with that status', () => {
    for (const code of codes) {
      const { problem } = toProblem(new AppError(code, 'What, why, and what to do.'), 'request-1')
      expect(problem).toMatchObject({ code, status: PROBLEMS[code].status, title: PROBLEMS[code].title, detail: 'What, why, and what to do.' })
    }
  })

  it('is thrown somewhere: a code that nothing uses is taken off the list', () => {
    const server = readSources().filter(({ path }) => path.startsWith('server/')).map(({ text }) => text).join('\n')
    expect(codes.filter(code => !server.includes(`'${code}'`))).toEqual([])
  })
})
