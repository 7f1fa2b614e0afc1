import { roomOf, type Permit, type Room } from './rooms'

/** What an import brings in: its values by name, "*" where all may come, nothing where it takes types only. */
export interface Brought {
  values: readonly string[]
}

/** Whether the file of one room may be imported by another, and if not, why not and what would be allowed. */
export function complaintAboutFile(room: Room, path: string, brought: Brought): string | null {
  const other = roomOf(path)
  const isFree = room.rooms.includes('*')
  if (!other || other.name === 'root') return isFree ? null : refusal(room, path, brought)
  if (other.name === room.name || isFree) return null
  if (!isPermitted(room.rooms, other.name, brought)) return refusal(room, other.name, brought)
  const isAtDoor = !other.doors || other.doors.includes(path)
  return isAtDoor ? null : `${other.name} is entered by its door only: ${other.doors?.join(' or ')}.`
}

/** The same for a package by its name. */
export function complaintAboutPackage(room: Room, name: string, brought: Brought): string | null {
  return isPermitted(room.packages, name, brought) ? null : refusal(room, `the package ${name}`, brought)
}

function isPermitted(permits: readonly Permit[], name: string, { values }: Brought): boolean {
  return permits.some((permit) => {
    const { room, only } = typeof permit === 'string' ? { room: permit, only: undefined } : permit
    const isNamed = room === name || room === '*' || (room.endsWith('*') && name.startsWith(room.slice(0, -1)))
    if (!isNamed || only === undefined) return isNamed
    return only === 'types' ? values.length === 0 : values.every(value => only.includes(value))
  })
}

function refusal(room: Room, what: string, { values }: Brought): string {
  const allowed = [...room.rooms, ...room.packages].map(spoken).join(', ') || 'nothing but itself'
  const brought = values.length > 0 ? `takes ${values.join(', ')} from ${what}` : `leans on ${what}`
  return `${room.name} (${room.purpose}) ${brought}. It may import: ${allowed}.`
}

function spoken(permit: Permit): string {
  if (typeof permit === 'string') return permit
  return `${permit.room} (${permit.only === 'types' ? 'types' : permit.only.join(', ')} only)`
}
