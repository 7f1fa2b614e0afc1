import { defineEventHandler, getQuery, getRequestHeader, getRouterParams, setResponseHeader, setResponseStatus } from 'h3'
import type { EventHandler, H3Event } from 'h3'
import { parseBy } from '#shared/schemas/parse'
import type { Schema } from '#shared/schemas/parse'
import type { Actor } from '#shared/schemas/people'
import { actingAs } from '../context/context'
import type { Context } from '../context/context'
import { AppError, inputInvalid, notFound, signInRequired } from '../errors/app-error'
import { isCrossSite } from './cross-site'
import { currentHouse } from './house'
import type { House } from './house'
import { readJsonBody } from './read-json-body'
import { answerProblem } from './answer-problem'

export const ACCESS_KINDS = ['public', 'signed-in', 'observer', 'coordinator', 'administrator'] as const
/** The coarse gate of a route. Whether this person may do it to this very thing is asked in the service's first line. */
export type Access = (typeof ACCESS_KINDS)[number]

export interface RouteInput<Params, Query, Body> {
  ctx: Context
  params: Params
  query: Query
  body: Body
  event: H3Event
  /** Gives a success another status than the route's own. */
  setStatus(status: number): void
}

export interface RouteDefinition<Params, Query, Body> {
  access: Access
  params?: Schema<Params>
  query?: Schema<Query>
  /** Given for JSON bodies; a route that streams its body leaves it out and reads the event. */
  body?: Schema<Body>
  /** Status of success, 200 by default (204 where the handler answers nothing). */
  status?: number
  handler(input: RouteInput<Params, Query, Body>): unknown
}

const SAFE_METHODS = new Set(['GET', 'HEAD', 'OPTIONS'])

/**
 * The one way a route is made: finds the session's person anew on every request, refuses requests of other sites, opens the
 * coarse gate, reads the input by its schemas, and answers what goes wrong as RFC 9457 problem details.
 */
export function defineRoute<Params = undefined, Query = undefined, Body = undefined>(route: RouteDefinition<Params, Query, Body>): EventHandler {
  return defineEventHandler(async (event) => {
    setResponseHeader(event, 'Cache-Control', 'no-store')
    const house = currentHouse()
    try {
      if (!house) throw new AppError('not-ready', 'The server is starting or stopping. Try again in a few seconds.')
      const ctx = await contextOf(event, house)
      openGate(route.access, ctx.actor)
      const input = {
        ctx,
        params: readParams(event, route.params),
        query: readQuery(event, route.query),
        body: await readBody(event, route.body),
        event,
        setStatus: (status: number) => setResponseStatus(event, status),
      }
      setResponseStatus(event, route.status ?? 200)
      const answer = await route.handler(input)
      return answer === undefined && !event.handled ? answerNothing(event) : answer
    }
    catch (error) {
      return answerProblem(event, error, house?.context.log ?? null)
    }
  })
}

async function contextOf(event: H3Event, house: House): Promise<Context> {
  if (!SAFE_METHODS.has(event.method)) refuseCrossSite(event, house.context.baseUrl)
  const sessionId = await house.sessionCookie.read(event)
  const actor = sessionId ? await house.actorOfSession(house.context, sessionId) : null
  event.context.sessionId = actor ? sessionId : null
  return actingAs(house.context, actor)
}

function refuseCrossSite(event: H3Event, baseUrl: string): void {
  const headers = {
    secFetchSite: getRequestHeader(event, 'sec-fetch-site'),
    origin: getRequestHeader(event, 'origin'),
    host: getRequestHeader(event, 'host'),
  }
  if (isCrossSite(headers, baseUrl)) {
    throw new AppError('cross-site', 'A page of another site sent this, so it was not carried out. Do it from the pages of this site.')
  }
}

function openGate(access: Access, actor: Actor | null): void {
  if (access === 'public') return
  if (!actor) throw signInRequired()
  const isOpen = {
    'signed-in': true,
    'observer': actor.isObserver,
    'coordinator': actor.coordinatorOf.length > 0,
    'administrator': actor.isAdministrator,
  }[access]
  if (!isOpen) throw notFound()
}

/** An address that cannot be one of ours is one where nothing is. */
function readParams<Params>(event: H3Event, schema: Schema<Params> | undefined): Params {
  if (!schema) return undefined as Params
  const parsed = parseBy(schema, getRouterParams(event, { decode: true }))
  if (!parsed.ok) throw notFound()
  return parsed.value
}

function readQuery<Query>(event: H3Event, schema: Schema<Query> | undefined): Query {
  if (!schema) return undefined as Query
  return valueOf(parseBy(schema, getQuery(event)))
}

async function readBody<Body>(event: H3Event, schema: Schema<Body> | undefined): Promise<Body> {
  if (!schema) return undefined as Body
  return valueOf(parseBy(schema, await readJsonBody(event)))
}

function valueOf<Value>(parsed: ReturnType<typeof parseBy<Value>>): Value {
  if (!parsed.ok) throw inputInvalid(parsed.fields)
  return parsed.value
}

function answerNothing(event: H3Event): null {
  setResponseStatus(event, 204)
  return null
}
