import type { DeskItem } from '#shared/schemas/fits'
import { formatCount, formatWaiting } from '#shared/units/date-text'

export interface DeskGroup {
  id: string
  name: string
  items: DeskItem[]
}

/** Puts what waits under its programme: programmes by name, within one the longest waiting first. */
export function groupByProgramme(items: readonly DeskItem[]): DeskGroup[] {
  const groups = new Map<string, DeskGroup>()
  for (const item of [...items].sort((a, b) => (a.waitingSince < b.waitingSince ? -1 : 1))) {
    const group = groups.get(item.programme.id) ?? { ...item.programme, items: [] }
    group.items.push(item)
    groups.set(group.id, group)
  }
  return [...groups.values()].sort((a, b) => (a.name < b.name ? -1 : 1))
}

/** The line under the heading: how much waits, and how long the oldest has. */
export function deskSentence(items: readonly DeskItem[], now: string): string {
  if (items.length === 0) return 'Nothing waits in the programmes you coordinate.'
  const oldest = items.map(item => item.waitingSince).sort()[0]!
  const many = items.length === 1
  return `${formatCount(items.length, 'fit')} ${many ? 'waits' : 'wait'} for a ruling. The ${many ? 'fit' : 'oldest'} has waited ${formatWaiting(oldest, now)}.`
}
