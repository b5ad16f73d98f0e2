import { createError, defineEventHandler, getQuery, getRequestHeader, getRouterParams, setResponseStatus, type H3Event } from 'h3'
import { z } from 'zod'
import type { Action, Actor } from '#shared/access/rules'
import { DomainError, type DomainErrorCode } from '#shared/errors'
import type { Database } from '#server/db/client'
import { authorise, wasAuthorised } from '#server/services/access/authorise'
import type { SessionPerson } from '#shared/types/session'
import { BODY_LIMIT, readLimitedBody } from '#server/utils/body'
import { databaseReady } from '#server/utils/database'
import { log } from '#server/utils/log'

const STATUS: Record<DomainErrorCode, number> = { 'not-found': 404, 'not-allowed': 403, 'conflict': 409, 'invalid': 422, 'too-many': 429, 'unavailable': 503 }
const none = z.object({}).strict()

type Schema = z.ZodTypeAny
type Parsed<S extends Schema> = z.output<S>

/** What a route's handler is given: parsed input, the database and who asks. */
export interface ApiContext<P extends Schema, Q extends Schema, B extends Schema> {
  event: H3Event
  db: Database
  actor: Actor
  person: SessionPerson
  params: Parsed<P>
  query: Parsed<Q>
  body: Parsed<B>
  now: Date
}

/** How a route is declared. `access` names the action; `on: 'facility'` checks it at once, else the handler's service checks the object. */
export interface ApiSpec<P extends Schema, Q extends Schema, B extends Schema> {
  access: Action
  on?: 'facility' | 'object'
  params?: P
  query?: Q
  body?: B
  status?: number
}

/**
 * Declares a route. The only place that parses input, asks who it is, maps errors to HTTP and insists that
 * somebody asked for the right: a handler whose object was never checked answers 500.
 *
 * @param spec the action, the schemas of path, query and body, and the status of success
 * @param handler calls a service and returns its reply
 */
export function defineApi<R, P extends Schema = typeof none, Q extends Schema = typeof none, B extends Schema = typeof none>(
  spec: ApiSpec<P, Q, B>,
  handler: (context: ApiContext<P, Q, B>) => R | Promise<R>,
) {
  return defineEventHandler(async (event): Promise<Awaited<R>> => {
    try {
      const { db } = await databaseReady()
      const person = event.context.person
      if (!person) throw sessionEnded()
      const actor = toActor(person)
      if (spec.on === 'facility') authorise(actor, spec.access)
      const params = (spec.params ?? none).parse(getRouterParams(event, { decode: true })) as Parsed<P>
      const query = (spec.query ?? none).parse(getQuery(event)) as Parsed<Q>
      const body = (spec.body ?? none).parse(spec.body ? await readJson(event) : {}) as Parsed<B>
      const reply = await handler({ event, db, actor, person, params, query, body, now: new Date() })
      if (!wasAuthorised(actor)) throw new Error(`${spec.access}: no object was checked`)
      if (spec.status) setResponseStatus(event, spec.status)
      return reply
    }
    catch (error) {
      throw toHttpError(error, event)
    }
  })
}

/** Declares a route that needs no session; `why` says what protects it instead. */
export function definePublicApi<R>(spec: { why: string }, handler: (context: { event: H3Event, db: Database, now: Date }) => R | Promise<R>) {
  return defineEventHandler(async (event): Promise<Awaited<R>> => {
    try {
      const { db } = await databaseReady()
      return await handler({ event, db, now: new Date() })
    }
    catch (error) {
      throw toHttpError(error, event)
    }
  })
}

/** The part of a person that rights depend on; a new object for each request. */
export function toActor(person: SessionPerson): Actor {
  return {
    personId: person.personId,
    isManager: person.isManager,
    isOperator: person.isOperator,
    memberships: person.groups.map(group => ({ groupId: group.id, role: group.role })),
  }
}

async function readJson(event: H3Event): Promise<unknown> {
  if (!getRequestHeader(event, 'content-type')?.startsWith('application/json')) {
    throw new DomainError('invalid', 'Send the request as JSON (content type application/json).')
  }
  const text = (await readLimitedBody(event, BODY_LIMIT.json)).toString('utf8')
  try {
    return JSON.parse(text, refusePrototypeKeys)
  }
  catch (error) {
    if (error instanceof DomainError) throw error
    throw new DomainError('invalid', 'The request is not valid JSON. Check it and send it again.')
  }
}

function refusePrototypeKeys(key: string, value: unknown) {
  if (key === '__proto__' || key === 'constructor' || key === 'prototype') throw new DomainError('invalid', `The key "${key}" is not allowed. Leave it out.`)
  return value
}

function sessionEnded() {
  return createError({ statusCode: 401, statusMessage: 'Unauthorized', message: 'You are not signed in, or your session has ended. Sign in again; what you typed is kept.', data: { code: 'signed-out', issues: [] } })
}

function toHttpError(error: unknown, event: H3Event) {
  if (error instanceof z.ZodError) {
    const issues = error.issues.map(({ path, message }) => ({ path, message }))
    return createError({ statusCode: 422, statusMessage: 'Invalid', message: 'Please correct the marked fields.', data: { code: 'invalid', issues } })
  }
  if (error instanceof DomainError) {
    return createError({ statusCode: STATUS[error.code], statusMessage: error.code, message: error.message, data: { code: error.code, issues: error.path.length ? [{ path: error.path, message: error.message }] : [] } })
  }
  if (error instanceof Error && 'statusCode' in error) return error
  log.error({ err: error, requestId: event.context.requestId, path: event.path }, 'request failed')
  return createError({ statusCode: 500, statusMessage: 'Error', message: `Something went wrong on our side. Try again; if it stays, tell the facility this number: ${event.context.requestId}.`, data: { code: 'internal', issues: [] } })
}
