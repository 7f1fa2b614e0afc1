import { once } from 'node:events'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { createApp, createRouter, getCookie, setCookie, toNodeListener } from 'h3'
import type { EventHandler, RouterMethod } from 'h3'
import { openHouse } from '../../server/http/house'
import type { SessionCookie } from '../../server/http/house'
import { actorOfSession } from '../../server/services/people/actor-of-session'
import { listRouteFiles } from './route-files'
import type { TestHouse } from './test-house'

export interface MountedServer {
  baseUrl: string
  /** A browser's view: keeps the cookie that it is given, sends it along. */
  client(): Client
  /** The header of a browser that holds this session. */
  cookieOf(sessionId: string): { cookie: string }
  /** Serves another house from now on. */
  serve(house: TestHouse): void
  close(): Promise<void>
}

export interface CallOptions {
  json?: unknown
  body?: BodyInit
  headers?: Record<string, string>
}

export interface Client {
  /** Another browser holding the same cookie, as a thief would. */
  copy(): Client
  // eslint-disable-next-line @typescript-eslint/no-explicit-any -- answers have many shapes; the assertions of each test check them
  call(method: string, path: string, options?: CallOptions): Promise<{ status: number, headers: Headers, json: any, text: string }>
}

const COOKIE = 'semilatus-test'

/** Unsealed: the sealed cookie is nuxt-auth-utils' and needs Nitro; it is looked at end to end. */
const sessionCookie: SessionCookie = {
  read: async event => getCookie(event, COOKIE) || null,
  write: async (event, sessionId) => setCookie(event, COOKIE, sessionId),
  clear: async event => setCookie(event, COOKIE, ''),
}

/** The real route files of the server on a port of their own, over a test house; one at a time in a process. */
export async function mountServer(house: TestHouse): Promise<MountedServer> {
  const serve = ({ ctx }: TestHouse) => openHouse({ context: ctx, sessionCookie, actorOfSession })
  serve(house)
  const router = createRouter()
  for (const { file, method, path } of await listRouteFiles()) {
    const { default: handler } = await import(/* @vite-ignore */ file) as { default: EventHandler }
    if (method === 'ALL') router.use(path, handler)
    else router.add(path, handler, method.toLowerCase() as RouterMethod)
  }
  const server = createServer(toNodeListener(createApp().use(router)))
  server.listen(0, '127.0.0.1')
  await once(server, 'listening')
  const baseUrl = `http://127.0.0.1:${(server.address() as AddressInfo).port}`
  return {
    baseUrl,
    client: () => createClient(baseUrl),
    cookieOf: sessionId => ({ cookie: `${COOKIE}=${sessionId}` }),
    serve,
    async close() {
      openHouse(null)
      server.closeAllConnections()
      server.close()
      await once(server, 'close')
    },
  }
}

export function createClient(baseUrl: string, cookie = ''): Client {
  return {
    copy: () => createClient(baseUrl, cookie),
    async call(method, path, { json, body, headers = {} } = {}) {
      const response = await fetch(`${baseUrl}${path}`, {
        method,
        redirect: 'manual',
        headers: { ...(cookie ? { cookie } : {}), ...(json === undefined ? {} : { 'content-type': 'application/json' }), ...headers },
        body: json === undefined ? body ?? null : JSON.stringify(json),
        ...(body instanceof ReadableStream ? { duplex: 'half' } : {}),
      } as RequestInit)
      for (const line of response.headers.getSetCookie()) cookie = line.split(';')[0]!
      const text = await response.text()
      return { status: response.status, headers: response.headers, text, json: /json/.test(response.headers.get('content-type') ?? '') ? JSON.parse(text) : null }
    },
  }
}
