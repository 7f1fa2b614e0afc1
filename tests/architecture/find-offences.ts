import { readAutoImports } from './auto-imports'
import { readImports, type FoundImport } from './read-imports'
import { resolveImport } from './resolve-import'
import { roomOf, type Permit, type Room } from './rooms'

/** Every import of a file that its room may not have, each as a sentence with its remedy. */
export function findOffences(path: string, text: string): string[] {
  const room = roomOf(path)
  if (!room) return [`${path} lies in no room. Move it into a folder that rooms.ts lists.`]
  const written = readImports(path, text).map(found => ({ found, complaint: complaintAbout(room, path, found) }))
  const unwritten = readAutoImports(path, text).map(found => ({ found, complaint: complaintAbout(room, path, found) }))
  return [...written, ...unwritten].flatMap(({ found, complaint }) => (complaint ? [`${path}:${found.line} ${found.form} "${found.specifier}": ${complaint}`] : []))
}

function complaintAbout(room: Room, path: string, found: FoundImport): string | null {
  const isFree = room.rooms.includes('*')
  if (found.specifier === null) return isFree || room.name === 'scripts' ? null : 'a computed import cannot be checked. Import by a literal path.'
  if (room.relativeOnly && /^[~#]/.test(found.specifier)) return `${room.name} imports its own files by relative path.`
  const resolved = resolveImport(found.specifier, path)
  if (resolved.kind === 'unknown') return 'it leads nowhere. Correct the path.'
  if (resolved.kind === 'package') return isPermitted(room.packages, resolved.name, found) ? null : refusal(room, `the package ${resolved.name}`, found)
  const other = roomOf(resolved.path)
  if (!other || other.name === 'root') return isFree ? null : refusal(room, resolved.path, found)
  if (other.name === room.name || isFree) return null
  if (!isPermitted(room.rooms, other.name, found)) return refusal(room, other.name, found)
  const isAtDoor = !other.doors || other.doors.includes(resolved.path)
  return isAtDoor ? null : `${other.name} is entered by its door only: ${other.doors?.join(' or ')}.`
}

function isPermitted(permits: readonly Permit[], name: string, found: FoundImport): boolean {
  return permits.some((permit) => {
    const { room, only } = typeof permit === 'string' ? { room: permit, only: undefined } : permit
    if (room !== '*' && room !== name && !(room.endsWith('*') && name.startsWith(room.slice(0, -1)))) return false
    if (only === undefined) return true
    return only === 'types' ? found.isTypeOnly : found.values.every(value => only.includes(value))
  })
}

function refusal(room: Room, what: string, found: FoundImport): string {
  const named = (permits: readonly Permit[]) => permits.map(permit => (typeof permit === 'string' ? permit : `${permit.room} (${permit.only === 'types' ? 'types' : permit.only.join(', ')} only)`))
  const allowed = [...named(room.rooms), ...named(room.packages)].join(', ') || 'nothing but itself'
  const brought = found.values.length > 0 ? `takes ${found.values.join(', ')} from ${what}` : `leans on ${what}`
  return `${room.name} (${room.purpose}) ${brought}. It may import: ${allowed}.`
}
