import type { Scene, Thing } from './scene'

export interface Case {
  /** As the router knows it. */
  route: string
  /** Which of several things, where a route has several rows. */
  about?: string
  /** Things for the path's parameters. */
  params?: Record<string, Thing | { text: string }>
  query?: (things: Scene['things']) => string
  json?: (things: Scene['things']) => unknown
  /** Body of an upload. */
  text?: string
  ifMatch?: keyof Scene['versions']
  /** Expected status by role, in the order of ROLES. */
  expect: readonly [number, number, number, number, number, number, number]
}

const everybody = (status: number) => [status, status, status, status, status, status, status] as const
const signedIn = (status: number) => [401, status, status, status, status, status, status] as const
const reason = 'Because the test says so.'
const n = { text: '1' }

/** What each role gets from each route: written by hand, from the permission table of the design. */
export const TABLE: readonly Case[] = [
  // visitor, member, observer, owner, coordinator, stranger, administrator
  { route: 'GET /healthz', expect: everybody(200) },
  { route: 'GET /readyz', expect: everybody(200) },
  { route: 'ALL /api/**', params: { '**': { text: 'v1/nowhere' } }, expect: everybody(404) },

  { route: 'GET /api/v1/me', expect: everybody(200) },
  { route: 'PATCH /api/v1/me', json: () => ({ displayName: 'Another Name' }), expect: signedIn(200) },
  { route: 'POST /api/v1/me/password', json: t => ({ currentPassword: t.password, newPassword: 'another long password' }), expect: signedIn(204) },
  { route: 'POST /api/v1/session', json: t => ({ email: t.ownerEmail, password: t.password }), expect: everybody(200) },
  { route: 'DELETE /api/v1/session', expect: signedIn(204) },
  { route: 'DELETE /api/v1/sessions', expect: signedIn(204) },

  { route: 'GET /api/v1/invitations/:token', params: { token: 'invitationToken' }, expect: everybody(200) },
  { route: 'POST /api/v1/invitations/:token/accept', params: { token: 'invitationToken' }, json: () => ({ email: 'new@example.org', displayName: 'Sefa Aldermoor', password: 'a long enough password' }), expect: everybody(200) },
  { route: 'GET /api/v1/invitations', expect: [401, 404, 404, 404, 404, 404, 200] },
  { route: 'POST /api/v1/invitations', json: () => ({ isObserver: true }), expect: [401, 404, 404, 404, 404, 404, 201] },
  { route: 'GET /api/v1/people', expect: [401, 404, 404, 404, 404, 404, 200] },
  { route: 'PATCH /api/v1/people/:id', params: { id: 'person' }, json: () => ({ isObserver: true, isAdministrator: false, coordinatorOf: [] }), expect: [401, 404, 404, 404, 404, 404, 200] },
  { route: 'GET /api/v1/audit', expect: [401, 404, 404, 404, 404, 404, 200] },

  { route: 'GET /api/v1/programmes', expect: everybody(200) },
  { route: 'POST /api/v1/programmes', json: () => ({ name: 'Comets' }), expect: [401, 404, 404, 404, 404, 404, 201] },
  { route: 'GET /api/v1/targets', expect: signedIn(200) },
  { route: 'GET /api/v1/targets/:id', params: { id: 'target' }, expect: signedIn(200) },
  { route: 'POST /api/v1/targets', json: t => ({ programmeId: t.programme, kind: 'relative', name: 'Linden 99 AB' }), expect: [401, 404, 404, 404, 201, 404, 404] },
  { route: 'PUT /api/v1/targets/:id/follow', params: { id: 'target' }, expect: signedIn(204) },
  { route: 'DELETE /api/v1/targets/:id/follow', params: { id: 'target' }, expect: signedIn(204) },
  { route: 'POST /api/v1/targets/:id/fits', params: { id: 'target' }, json: t => ({ baseFitId: t.waitingFit, setAside: [{ measureId: t.measure, reason }] }), expect: [401, 404, 404, 404, 201, 404, 404] },

  { route: 'GET /api/v1/batches', expect: signedIn(200) },
  { route: 'POST /api/v1/batches', query: t => `fileName=a.csv&kind=relative&targetId=${t.target}`, text: 'epoch,theta_deg,rho_arcsec\n2020.5,100,0.8\n', expect: [401, 404, 201, 201, 404, 404, 404] },
  { route: 'GET /api/v1/batches/:id', about: 'a draft', params: { id: 'draftBatch' }, expect: [401, 404, 404, 200, 404, 404, 404] },
  { route: 'GET /api/v1/batches/:id', about: 'one that was sent', params: { id: 'sentBatch' }, expect: signedIn(200) },
  { route: 'GET /api/v1/batches/:id/raw', about: 'a draft', params: { id: 'draftBatch' }, expect: [401, 404, 404, 200, 404, 404, 404] },
  { route: 'GET /api/v1/batches/:id/raw', about: 'one that was sent', params: { id: 'sentBatch' }, expect: [401, 404, 404, 200, 200, 404, 404] },
  { route: 'GET /api/v1/batches/:id/rows', about: 'a draft', params: { id: 'draftBatch' }, expect: [401, 404, 404, 200, 404, 404, 404] },
  { route: 'GET /api/v1/batches/:id/rows', about: 'one that was sent', params: { id: 'sentBatch' }, expect: signedIn(200) },
  { route: 'PATCH /api/v1/batches/:id/rows/:rowId', params: { id: 'draftBatch', rowId: 'badRow' }, json: () => ({ cells: { theta_deg: '61' } }), expect: [401, 404, 404, 200, 404, 404, 404] },
  { route: 'PUT /api/v1/batches/:id/target', params: { id: 'draftBatch' }, json: t => ({ targetId: t.publishedTarget }), expect: [401, 404, 404, 200, 404, 404, 404] },
  { route: 'POST /api/v1/batches/:id/send', params: { id: 'draftBatch' }, json: () => ({}), expect: [401, 404, 404, 200, 404, 404, 404] },
  { route: 'POST /api/v1/batches/:id/withdraw', params: { id: 'sentBatch' }, json: t => ({ targetId: t.target }), expect: [401, 404, 404, 200, 404, 404, 404] },
  { route: 'DELETE /api/v1/batches/:id', params: { id: 'draftBatch' }, expect: [401, 404, 404, 204, 404, 404, 404] },

  { route: 'GET /api/v1/fits/:id', params: { id: 'waitingFit' }, expect: signedIn(200) },
  { route: 'POST /api/v1/fits/:id/ruling', params: { id: 'waitingFit' }, ifMatch: 'waitingFit', json: () => ({ decision: 'accept', reason }), expect: [401, 404, 404, 404, 200, 404, 404] },
  { route: 'POST /api/v1/fits/:id/publish', params: { id: 'acceptedFit' }, ifMatch: 'acceptedFit', json: () => ({}), expect: [401, 404, 404, 404, 201, 404, 404] },
  { route: 'GET /api/v1/desk', expect: [401, 404, 404, 404, 200, 200, 404] },
  { route: 'GET /api/v1/events', about: 'a target', query: t => `topics=target:${t.target}`, expect: signedIn(200) },
  { route: 'GET /api/v1/events', about: 'a draft batch', query: t => `topics=batch:${t.draftBatch}`, expect: [401, 404, 404, 200, 404, 404, 404] },
  { route: 'GET /api/v1/events', about: 'the desk', query: () => 'topics=desk', expect: [401, 404, 404, 404, 200, 200, 404] },

  { route: 'GET /api/v1/orbits', expect: everybody(200) },
  { route: 'GET /api/v1/orbits/:targetId/:n', params: { targetId: 'publishedTarget', n }, expect: everybody(200) },
  ...['snapshot.json', 'measures.csv', 'set-aside.csv', 'ephemeris.csv', 'elements.csv'].map(file => (
    { route: `GET /api/v1/orbits/:targetId/:n/${file}`, params: { targetId: 'publishedTarget', n }, expect: everybody(200) } as const
  )),
  { route: 'POST /api/v1/orbits/:targetId/:n/withdraw', params: { targetId: 'publishedTarget', n }, ifMatch: 'edition', json: () => ({ reason }), expect: [401, 404, 404, 404, 200, 404, 404] },

  { route: 'GET /api/v1/unsubscribe/:token', params: { token: 'unsubscribeToken' }, expect: everybody(200) },
  { route: 'POST /api/v1/unsubscribe/:token', params: { token: 'unsubscribeToken' }, json: () => ({ scope: 'target' }), expect: everybody(200) },
  { route: 'POST /unsubscribe/:token', params: { token: 'unsubscribeToken' }, expect: everybody(200) },
]
