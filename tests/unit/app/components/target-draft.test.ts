import { describe, expect, it } from 'vitest'
import { blankTarget, targetBody } from '../../../../app/components/target/target-draft'
import { createTargetSchema } from '../../../../shared/schemas/targets'

const programmeId = 'a'.repeat(26)

describe('a new target as typed', () => {
  it('a pair is sent with its components, and aliases are split at commas', () => {
    const body = targetBody({ ...blankTarget(programmeId), name: 'Linden 12 AB', aliases: 'L 12, , Linden 12', componentA: 'A', componentB: 'B', radiusUnit: 'au' })
    expect(createTargetSchema.parse(body)).toMatchObject({ kind: 'relative', aliases: ['L 12', 'Linden 12'], componentA: 'A', componentB: 'B', caution: 'none' })
    expect(body).not.toHaveProperty('radiusUnit')
  })

  it('a decimal comma is read, and the Sun carries its caution', () => {
    const body = targetBody({ ...blankTarget(programmeId), kind: 'plane', name: 'Earth', radiusUnit: 'au', diameterScaleArcmin: '31,99', isSun: true })
    expect(createTargetSchema.parse(body)).toMatchObject({ diameterScaleArcmin: 31.99, caution: 'sun', radiusUnit: 'au' })
  })

  it('a comet is sent by its name alone', () => {
    const body = targetBody({ ...blankTarget(programmeId), kind: 'equatorial', name: 'Comet Ilmenau 4', componentA: 'A', radiusUnit: 'au', isSun: true })
    expect(createTargetSchema.parse(body)).toMatchObject({ kind: 'equatorial', name: 'Comet Ilmenau 4', caution: 'none' })
    expect(body).not.toHaveProperty('componentA')
  })

  it('a scale that is no number is refused by the schema rather than dropped', () => {
    const body = targetBody({ ...blankTarget(programmeId), kind: 'plane', name: 'Earth', diameterScaleArcmin: 'about 32' })
    expect(createTargetSchema.safeParse(body).success).toBe(false)
  })
})
