import { readdirSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { beforeAll, describe, expect, inject, it } from 'vitest'
import { type ApiClient, anonymousClient, signedInClient } from '../support/client'

// Who may use which route on an object of the Alder group. `own` is Alder's, `other` another group's people.
// Every route file of server/api must have a row here; who is not named must be refused.
const ROLES = ['manager', 'operator', 'own member', 'own PI', 'other member', 'other PI'] as const
type Role = (typeof ROLES)[number]

const EVERYONE = [...ROLES]
const FACILITY: Role[] = ['manager', 'operator']
const READERS: Role[] = ['manager', 'operator', 'own member', 'own PI']
const OWN: Role[] = ['own member', 'own PI']

interface Row { may: readonly Role[], body?: unknown, query?: string, file?: string }
const uuid = '01a20000-0000-7000-8000-000000000000'
const now = new Date().toISOString()
// Valid, but on a run that is settled or an object that is not there: who may gets as far as a conflict or a sentence.
const note = { kind: 'note', note: 'x', at: now, clientKey: uuid }
const sample = { groupId: ':group', name: 'Cu', formula: 'Cu', kind: 'metal', hazards: '' }
const plan = { cryostatId: ':cryostat', groupId: ':group', sampleIds: [':sample'], temperatureLowK: 5, temperatureHighK: 10, points: 10, nitrogenPrecool: true, sweeps: 0 }

const TABLE: Record<string, Row> = {
  'GET /api/board': { may: EVERYONE, query: '?from=2027-01-04&to=2027-01-18' },
  'GET /api/board/month': { may: EVERYONE, query: '?month=2027-01' },
  'POST /api/closures': { may: ['manager'], body: { cryostatId: ':cryostat', startsAt: now, endsAt: '2030-01-01T00:00:00Z', reason: 'x' } },
  'DELETE /api/closures/:closure': { may: ['manager'] },
  'GET /api/cryostats': { may: EVERYONE },
  'GET /api/cryostats/:slug': { may: EVERYONE },
  'GET /api/helium/forecast': { may: EVERYONE, query: '?from=2027-01-04&to=2027-01-18' },
  'GET /api/helium': { may: FACILITY },
  'POST /api/helium/deliveries/:delivery/receive': { may: FACILITY, body: { litres: 1 } },
  'POST /api/plan/estimate': { may: ['manager', ...OWN], body: plan },
  'GET /api/runs': { may: EVERYONE },
  'POST /api/runs': { may: ['manager', ...OWN], body: { ...plan, title: 'x', startsAt: '2020-01-01T00:00:00Z', clientKey: uuid } },
  'GET /api/runs/:run': { may: READERS },
  'GET /api/runs/:run/sheet': { may: READERS },
  'GET /api/runs/:run/feed': { may: READERS },
  'POST /api/runs/:run/approve': { may: ['manager'], body: {} },
  'POST /api/runs/:run/decline': { may: ['manager'], body: { reason: 'x' } },
  'POST /api/runs/:run/withdraw': { may: ['manager', ...OWN], body: {} },
  'POST /api/runs/:run/deposit': { may: OWN, body: {} },
  'POST /api/runs/:run/start': { may: FACILITY, body: {} },
  'POST /api/runs/:run/entries': { may: FACILITY, body: note },
  'POST /api/runs/:run/finish': { may: FACILITY, body: { operatorHours: 1 } },
  'POST /api/runs/:run/datasets': { may: READERS, file: 'T/K,C/(mJ/(mol K))\n2,1\n3,2\n' },
  'GET /api/samples': { may: EVERYONE },
  'POST /api/samples': { may: ['manager', ...OWN], body: sample },
  'GET /api/samples/:sample': { may: READERS },
  'PUT /api/samples/:sample': { may: ['manager', ...OWN], body: sample },
  'GET /api/results': { may: EVERYONE },
  'GET /api/datasets/:dataset': { may: READERS },
  'GET /api/datasets/:dataset/file': { may: READERS },
  'GET /api/datasets/:dataset/points': { may: READERS },
  'GET /api/datasets/:dataset/preview': { may: READERS },
  'PUT /api/datasets/:dataset/mapping': { may: READERS, body: { columns: { temperature: { column: 0, unit: 'K' }, heatCapacity: { column: 1, unit: 'mJ/(mol K)' } }, sample: { formula: 'Cu', kind: 'metal' } } },
  'POST /api/datasets/:dataset/analyses': { may: READERS, body: { model: { terms: ['gamma', 'beta3'], windowK: [1.5, 9] } } },
  'GET /api/analyses/:analysis': { may: READERS },
  'POST /api/analyses/:analysis/sign-off': { may: ['manager', 'own PI'], body: { accepted: true, reason: 'x' } },
  'POST /api/analyses/:analysis/comments': { may: READERS, body: { text: 'x' } },
  'POST /api/heat-capacity/check': { may: EVERYONE, body: {} },
  'GET /api/invoices': { may: ['manager', 'own PI', 'other PI'] },
  'GET /api/invoices/:invoice': { may: ['manager', 'own PI'] },
  'GET /api/invoices/:invoice/pdf': { may: ['manager', 'own PI'] },
  'GET /api/groups/:group': { may: ['manager', 'own PI'] },
  'GET /api/rates': { may: EVERYONE },
  'GET /api/people': { may: ['manager'] },
  'GET /api/desk': { may: ['manager'] },
  'GET /api/today': { may: FACILITY },
  'GET /api/sessions': { may: EVERYONE },
  'DELETE /api/sessions/:session': { may: [] },
}
/** Routes that are protected by something else than a session, or say nothing. */
const WITHOUT_SESSION = ['POST /api/payments/webhook', 'ANY /api/auth/:...']

const clients = {} as Record<Role, ApiClient>
const ids: Record<string, string> = { ':closure': uuid, ':delivery': uuid, ':session': uuid, ':slug': 'petrel', ':dataset': uuid, ':analysis': uuid }

beforeAll(async () => {
  const as: Record<Role, string> = { 'manager': 'manager', 'operator': 'operator', 'own member': 'visiting user, Alder', 'own PI': 'PI, Alder', 'other member': 'visiting user, Rowan', 'other PI': 'PI, Cedar' }
  for (const role of ROLES) clients[role] = await signedInClient(as[role])
  const { manager, 'own PI': pi } = clients
  const runs = (await pi.get<{ items: { id: string }[] }>('/api/runs?state=settled')).body.items
  ids[':run'] = runs[0]!.id
  ids[':sample'] = (await pi.get<{ id: string }[]>('/api/samples')).body[0]!.id
  ids[':group'] = (await pi.get<{ groupId: string }>(`/api/samples/${ids[':sample']}`)).body.groupId
  ids[':invoice'] = (await pi.get<{ id: string }[]>('/api/invoices')).body[0]!.id
  ids[':cryostat'] = (await manager.get<{ cryostats: { id: string }[] }>('/api/cryostats')).body.cryostats[0]!.id
  const results = (await pi.get<{ items: { datasetId: string, latest: { analysisId: string } | null }[] }>('/api/results')).body.items
  const checked = results.find(result => result.latest !== null)!
  Object.assign(ids, { ':dataset': checked.datasetId, ':analysis': checked.latest!.analysisId })
})

const fill = (text: string) => text.replace(/:[a-z]+\b/g, name => ids[name] ?? name)

async function statusOf(client: ApiClient, route: string, { body, query = '', file }: Row): Promise<number> {
  const [method = 'GET', path = ''] = route.split(' ')
  if (path.endsWith('/feed')) return feedStatus(client, fill(path))
  const form = new FormData()
  if (file) {
    form.append('role', 'measurement')
    form.append('file', new Blob([file], { type: 'text/csv' }), 'table.csv')
  }
  const reply = await client.request(method, fill(path) + query, file ? form : body === undefined ? undefined : JSON.parse(fill(JSON.stringify(body))))
  return reply.status
}

/** The stream stays open when it is allowed: only its status is read. */
async function feedStatus(client: ApiClient, path: string): Promise<number> {
  const abort = new AbortController()
  const reply = await fetch(`${inject('server').origin}${path}`, { signal: abort.signal, headers: { cookie: [...client.cookies].map(pair => pair.join('=')).join('; ') } })
  abort.abort()
  return reply.status
}

function routesOnDisk(): string[] {
  const root = fileURLToPath(new URL('../../server/api', import.meta.url))
  return readdirSync(root, { recursive: true, encoding: 'utf8' }).filter(file => file.endsWith('.ts')).map((file) => {
    const [, path = '', method = 'any'] = /^(.*?)(?:\.(get|post|put|delete|patch))?\.ts$/.exec(file) ?? []
    const named = path.replace(/\/?index$/, '').replace(/\[\.\.\.\]/, ':...').replace(/\[([a-z]+?)(?:Id)?\]/g, (_, name: string) => `:${name === 'id' ? 'closure' : name}`)
    return `${method.toUpperCase()} /api${named ? `/${named}` : ''}`
  })
}

describe('access', () => {
  it('has a row for every route, and a route for every row', () => {
    expect(routesOnDisk().toSorted()).toEqual([...Object.keys(TABLE), ...WITHOUT_SESSION].toSorted())
  })

  it('declares what protects it in every route file', () => {
    const root = fileURLToPath(new URL('../../server/api', import.meta.url))
    const undeclared = readdirSync(root, { recursive: true, encoding: 'utf8' }).filter(file => file.endsWith('.ts') && !/auth\//.test(file))
      .filter(file => !/defineApi\(\s*\{\s*access: '[a-z-]+:[a-z-]+'|definePublicApi\(\s*\{\s*why: '/.test(readFileSync(`${root}/${file}`, 'utf8')))
    expect(undeclared).toEqual([])
  })

  it.each(Object.keys(TABLE))('%s asks for a session', async (route) => {
    expect(await statusOf(anonymousClient(), route, TABLE[route]!)).toBe(401)
  })

  describe.each(Object.entries(TABLE))('%s', (route, row) => {
    it.each(ROLES)('%s', async (role) => {
      const status = await statusOf(clients[role], route, row)
      const missing = /:(closure|delivery|session)/.test(route)
      if (row.may.includes(role)) {
        expect(status).toBeLessThan(500)
        expect(missing ? [404, 409] : [200, 201, 409, 422, 400, 415]).toContain(status)
      }
      else expect([403, 404]).toContain(status)
    })
  })

  it('answers the same for an object of another group and one that does not exist', async () => {
    const [foreign, absent] = [await clients['other PI'].get<{ message: string }>(`/api/runs/${ids[':run']}`), await clients['other PI'].get<{ message: string }>(`/api/runs/${uuid}`)]
    expect([foreign.status, foreign.body.message]).toEqual([absent.status, absent.body.message])
  })

  it('leaves prices out for operators, and other groups\' titles out of the board for visitors', async () => {
    expect((await clients.operator.get<{ quote: unknown }>(`/api/runs/${ids[':run']}`)).body.quote).toBeNull()
    const board = JSON.stringify((await clients['other member'].get('/api/board?from=2026-01-05&to=2027-12-31')).body)
    expect(board).not.toContain('Heavy-electron')
  })

  it('refuses unknown keys, prototype keys, bodies that are no JSON, and changes sent from another site', async () => {
    const { manager } = clients
    const path = `/api/runs/${ids[':run']}/approve`
    expect((await manager.post(path, { reason: '', state: 'confirmed' })).status).toBe(422)
    expect((await manager.request('POST', path, undefined, { 'content-type': 'application/json' })).status).toBe(422)
    expect((await manager.request('POST', path, {}, { origin: 'https://elsewhere.example' })).status).toBe(403)
    expect((await manager.request('POST', path, {}, { 'sec-fetch-site': 'cross-site' })).status).toBe(403)
    const big = await manager.post(path, { reason: 'x'.repeat(1_100_000) })
    expect(big.status).toBe(413)
  })

  it('ends a session for good: the next request of its cookie is refused', async () => {
    const client = await signedInClient('operator, second shift')
    const { body: sessions } = await client.get<{ id: string }[]>('/api/sessions')
    expect((await client.request('DELETE', `/api/sessions/${sessions[0]!.id}`)).status).toBe(200)
    expect((await client.get('/api/today')).status).toBe(401)
  })
})
