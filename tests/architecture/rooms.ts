/**
 * The floor plan: which folder is which room, and what each room may import. What is not listed is forbidden.
 * The test imports.test.ts holds the code to it; eslint.config.mjs makes the editor's rule of it. This file imports nothing.
 */

/** Another room, or only part of what it offers: its types, or values by name beside its types. */
export type Permit = string | { room: string, only: 'types' | readonly string[] }

export interface Room {
  name: string
  /** Folders, or single files; the longest match decides. */
  places: readonly string[]
  /** What it is for, as a remedy says it. */
  purpose: string
  /** Where others come in; without it every file may be imported. */
  doors?: readonly string[]
  rooms: readonly Permit[]
  /** Packages by name, a scope by "@scope/*", Node's own modules by "node:*". "*" is any. */
  packages: readonly Permit[]
  /** Paths such as #shared/… are refused: the room is carried to other places as it is. */
  relativeOnly?: boolean
}

const ENGINE_TYPES: Permit = { room: 'fitting', only: 'types' }
const DB_TYPES: Permit = { room: 'server/db', only: 'types' }
const OF_SERVER = [
  'server/routes', 'server/http', 'server/context', 'server/services', 'server/domain', 'server/repositories', 'server/db', 'server/db/migrations',
  'server/jobs/contracts', 'server/jobs/queue', 'server/jobs/definitions', 'server/jobs/runner', 'server/jobs/workers',
  'server/mail/outbox', 'server/mail/templates', 'server/mail/transports', 'server/audit', 'server/errors', 'server/config',
] as const

export const ROOMS: readonly Room[] = [
  {
    name: 'fitting',
    places: ['fitting'],
    purpose: 'pure numerics, the same to the last bit in every engine',
    doors: ['fitting/index.ts', 'fitting/types.ts', 'fitting/time/index.ts'],
    rooms: [],
    packages: ['ml-levenberg-marquardt', 'ml-matrix', 'pure-rand'],
    relativeOnly: true,
  },
  {
    name: 'shared',
    places: ['shared'],
    purpose: 'what browser and server both speak',
    rooms: ['fitting'],
    packages: ['zod', 'papaparse'],
  },
  {
    name: 'app',
    places: ['app'],
    purpose: 'the browser; it reaches the server over HTTP only',
    rooms: ['shared', 'fitting'],
    packages: ['vue', 'vue-router', 'pinia', 'nuxt', '#app', '#imports', '#components', '@vueuse/core', 'reka-ui', '@tanstack/vue-table', 'plotly.js-cartesian-dist-min', '@fontsource/*', '@fontsource-variable/*'],
  },
  {
    name: 'server/routes',
    places: ['server/api', 'server/routes'],
    purpose: 'translates HTTP: reads input, calls one service, answers',
    rooms: ['server/http', 'server/services', 'shared'],
    packages: [],
  },
  {
    name: 'server/http',
    places: ['server/http'],
    purpose: 'the one route definer',
    rooms: ['server/context', 'server/errors', 'shared'],
    packages: ['h3', 'nuxt-auth-utils', '#imports', 'node:*'],
  },
  {
    name: 'server/context',
    places: ['server/context'],
    purpose: 'database, clock, ids and actor, built once in plugins',
    rooms: ['server/db', 'server/config', 'shared'],
    packages: ['pino', 'node:*'],
  },
  {
    name: 'server/services',
    places: ['server/services'],
    purpose: 'one use case a file; knows no HTTP and no SQL',
    rooms: [
      'server/context', 'server/domain', 'server/repositories', 'server/jobs/contracts', 'server/jobs/queue', 'server/mail/outbox',
      'server/audit', 'server/errors', 'shared',
      // The version is part of what makes two fits the same; the engine itself runs in the workers.
      { room: 'fitting', only: ['predict', 'ENGINE_VERSION'] },
    ],
    packages: [{ room: 'node:crypto', only: ['createHash', 'createHmac', 'timingSafeEqual'] }],
  },
  {
    name: 'server/domain',
    places: ['server/domain'],
    purpose: 'pure rules: decides and fetches nothing',
    rooms: ['shared', ENGINE_TYPES],
    // The same text gives the same bytes and the same hash: as pure as arithmetic.
    packages: ['canonicalize', { room: 'node:crypto', only: ['createHash'] }],
  },
  {
    name: 'server/repositories',
    places: ['server/repositories'],
    purpose: 'all SQL',
    // Long lists are read and written in slices, so that others are answered meanwhile.
    rooms: [DB_TYPES, 'server/errors', { room: 'shared', only: ['createTurns'] }, ENGINE_TYPES],
    packages: ['kysely'],
  },
  {
    name: 'server/db',
    places: ['server/db', 'server/db/migrations/index.ts'],
    purpose: 'the connections, the schema and how it is brought up to date',
    rooms: ['server/config', 'server/db/migrations'],
    packages: ['kysely', 'better-sqlite3', 'node:*'],
  },
  {
    name: 'server/db/migrations',
    places: ['server/db/migrations'],
    purpose: 'frozen once landed, so it leans on nothing that can change',
    rooms: [],
    packages: ['kysely'],
  },
  {
    name: 'server/jobs/contracts',
    places: ['server/jobs/contracts'],
    purpose: 'the name and the schema of every job',
    rooms: ['shared', 'server/repositories'],
    packages: ['zod'],
  },
  {
    name: 'server/jobs/queue',
    places: ['server/jobs/queue'],
    purpose: 'puts jobs into the table',
    rooms: ['server/jobs/contracts', 'shared', 'server/repositories'],
    packages: [],
  },
  {
    name: 'server/jobs/definitions',
    places: ['server/jobs/definitions'],
    purpose: 'a handler is a route without HTTP',
    rooms: ['server/jobs/contracts', 'server/jobs/runner', 'server/services', 'server/context'],
    packages: [],
  },
  {
    name: 'server/jobs/runner',
    places: ['server/jobs/runner'],
    purpose: 'takes jobs from the table and runs them under a lease',
    rooms: ['server/jobs/contracts', 'server/services', 'server/context', 'server/repositories', 'server/audit', 'shared', ENGINE_TYPES],
    // The pool of threads is the runner's; what runs in a thread is a worker.
    packages: ['piscina', 'node:*'],
  },
  {
    name: 'server/jobs/workers',
    places: ['server/jobs/workers'],
    purpose: 'the only caller of fitOrbit on the server; never touches the database',
    rooms: ['fitting'],
    // Lowering the thread's own priority is all it asks of the system.
    packages: ['node:worker_threads', { room: 'node:os', only: ['constants', 'setPriority'] }],
  },
  {
    name: 'server/mail/outbox',
    places: ['server/mail/outbox'],
    purpose: 'writes letters into the outbox',
    rooms: ['server/repositories', 'server/mail/templates', 'server/jobs/queue', 'shared'],
    packages: ['node:crypto'],
  },
  {
    name: 'server/mail/templates',
    places: ['server/mail/templates'],
    purpose: 'receives plain data and queries nothing',
    rooms: ['shared'],
    packages: [],
  },
  {
    name: 'server/mail/transports',
    places: ['server/mail/transports'],
    purpose: 'hands letters over',
    rooms: ['server/config', { room: 'server/mail/outbox', only: ['MailRefusedError'] }],
    packages: ['nodemailer'],
  },
  {
    name: 'server/audit',
    places: ['server/audit'],
    purpose: 'the record of every change',
    rooms: ['server/repositories', 'shared'],
    packages: [],
  },
  {
    name: 'server/errors',
    places: ['server/errors'],
    purpose: 'a closed list of codes and one mapper',
    rooms: ['shared'],
    packages: [],
  },
  {
    name: 'server/config',
    places: ['server/config'],
    purpose: 'the only reader of the environment',
    rooms: [],
    packages: ['node:path'],
  },
  {
    name: 'server/plugins',
    places: ['server/plugins', 'server/middleware'],
    purpose: 'here the server is put together',
    rooms: [...OF_SERVER, 'shared', ENGINE_TYPES],
    packages: ['h3', 'nitropack', '#imports', 'piscina', 'node:*'],
  },
  {
    name: 'scripts',
    places: ['scripts'],
    purpose: 'commands; what runs before the packages are there is .mjs with Node only',
    rooms: ['shared', 'fitting'],
    packages: ['node:*', 'esbuild', 'smtp-server', 'autocannon'],
  },
  {
    name: 'modules',
    places: ['modules'],
    purpose: 'extends the build',
    rooms: [],
    packages: ['@nuxt/kit', { room: 'rollup', only: 'types' }, 'node:*'],
  },
  {
    name: 'tests',
    places: ['tests'],
    purpose: 'may look everywhere',
    rooms: ['*'],
    packages: ['*'],
  },
  {
    name: 'root',
    places: ['nuxt.config.ts', 'vitest.config.ts', 'tailwind.config.ts', 'eslint.config.mjs'],
    purpose: 'settings of the tools',
    rooms: ['*'],
    packages: ['*'],
  },
]

/** The folders that the root may have. */
export const TOP_FOLDERS = ['app', 'server', 'shared', 'fitting', 'public', 'modules', 'scripts', 'tests', 'docs'] as const

/** The room of a file by its path from the root; undefined where it lies in none. */
export function roomOf(path: string): Room | undefined {
  const matches = ROOMS.flatMap(room => room.places.filter(place => path === place || path.startsWith(`${place}/`)).map(place => ({ room, place })))
  return matches.sort((a, b) => b.place.length - a.place.length)[0]?.room
}
