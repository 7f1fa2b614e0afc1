import { describe, expect, it } from 'vitest'
import { deskSentence, groupByProgramme } from '../../../../app/components/desk/group-by-programme'
import type { DeskItem } from '../../../../shared/schemas/fits'

const item = (targetName: string, programme: string, waitingSince: string) => ({ targetName, programme: { id: programme, name: programme }, waitingSince }) as DeskItem
const now = '2026-12-07T12:00:00.000Z'
const items = [item('Linden 12 AB', 'Northern pairs', '2026-12-05T12:00:00.000Z'), item('Ilmenau 9', 'Bright comets', '2026-12-06T12:00:00.000Z'), item('Linden 7 AB', 'Northern pairs', '2026-12-01T12:00:00.000Z')]

describe('the desk', () => {
  it('programmes stand by name, and in each the longest waiting first', () => {
    expect(groupByProgramme(items).map(group => [group.name, group.items.map(one => one.targetName)])).toEqual([
      ['Bright comets', ['Ilmenau 9']],
      ['Northern pairs', ['Linden 7 AB', 'Linden 12 AB']],
    ])
  })

  it('says how much waits and how long', () => {
    expect(deskSentence(items, now)).toBe('3 fits wait for a ruling. The oldest has waited 6 days.')
    expect(deskSentence(items.slice(0, 1), now)).toBe('1 fit waits for a ruling. The fit has waited 2 days.')
    expect(deskSentence([], now)).toBe('Nothing waits in the programmes you coordinate.')
  })
})
