import { readdir } from 'node:fs/promises'
import { join, relative, sep } from 'node:path'
import { fileURLToPath } from 'node:url'

export interface RouteFile {
  /** Absolute path of the file. */
  file: string
  /** Upper case, or ALL where the file's name has no method. */
  method: string
  /** As Nitro's router writes it: /api/v1/people/:id. */
  path: string
}

const SERVER = fileURLToPath(new URL('../../server', import.meta.url))
const METHODS = ['get', 'post', 'put', 'patch', 'delete']

/** Every route file of server/api and server/routes, by Nitro's naming rule. */
export async function listRouteFiles(): Promise<RouteFile[]> {
  const found: RouteFile[] = []
  for (const folder of ['api', 'routes']) {
    const entries = await readdir(join(SERVER, folder), { recursive: true, withFileTypes: true })
    for (const entry of entries) {
      if (entry.isFile() && entry.name.endsWith('.ts')) found.push(routeOf(join(entry.parentPath, entry.name), folder))
    }
  }
  return found.sort((a, b) => `${a.path} ${a.method}`.localeCompare(`${b.path} ${b.method}`))
}

function routeOf(file: string, folder: string): RouteFile {
  let name = relative(join(SERVER, folder), file).split(sep).join('/').replace(/\.ts$/, '')
  const method = METHODS.find(word => name.endsWith(`.${word}`))
  if (method) name = name.slice(0, -method.length - 1)
  const path = name.replace(/(^|\/)index$/, '').replace(/\[\.\.\.\]/g, '**').replace(/\[([^\]]+)\]/g, ':$1')
  return { file, method: method?.toUpperCase() ?? 'ALL', path: `/${folder === 'api' ? 'api/' : ''}${path}`.replace(/\/$/, '') }
}
