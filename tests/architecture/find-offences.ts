import { readAutoImports } from './auto-imports'
import { complaintAboutFile, complaintAboutPackage } from './permits'
import { readImports, type FoundImport } from './read-imports'
import { resolveImport } from './resolve-import'
import { roomOf, type Room } from './rooms'

/** Every import of a file that its room may not have, each as a sentence with its remedy. */
export function findOffences(path: string, text: string): string[] {
  const room = roomOf(path)
  if (!room) return [`${path} lies in no room. Move it into a folder that rooms.ts lists.`]
  return [...readImports(path, text), ...readAutoImports(path, text)].flatMap((found) => {
    const complaint = complaintAbout(room, path, found)
    return complaint ? [`${path}:${found.line} ${found.form} "${found.specifier}": ${complaint}`] : []
  })
}

function complaintAbout(room: Room, path: string, found: FoundImport): string | null {
  if (found.specifier === null) {
    return room.rooms.includes('*') || room.name === 'scripts' ? null : 'a computed import cannot be checked. Import by a literal path.'
  }
  if (room.relativeOnly && /^[~#]/.test(found.specifier)) return `${room.name} imports its own files by relative path.`
  const resolved = resolveImport(found.specifier, path)
  if (resolved.kind === 'unknown') return 'it leads nowhere. Correct the path.'
  return resolved.kind === 'package' ? complaintAboutPackage(room, resolved.name, found) : complaintAboutFile(room, resolved.path, found)
}
