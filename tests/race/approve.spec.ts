import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { RunDetail } from '#shared/types/runs'
import { type ApiClient, signedInClient } from '../support/client'
import { planOf } from '../support/facility-client'
import { createDatabase, startPostgres, type TestPostgres } from '../support/postgres'
import { type StartedServer, startServer } from '../support/server'

const REQUESTS = 50

/** Fifty overlapping requests on Fulmar, approved all at once. */
async function approveAllAtOnce(server: StartedServer) {
  const [user, manager] = [await signedInClient('visiting user, Alder', server), await signedInClient('manager', server)]
  const plan = await planOf(user, 'fulmar')
  const ids: string[] = []
  for (let index = 0; index < REQUESTS; index += 1) {
    const startsAt = new Date(Date.parse(plan.startsAt) + index * 1_800_000).toISOString()
    const { body } = await user.post<{ id: string }>('/api/runs', { ...plan, startsAt, clientKey: crypto.randomUUID() })
    ids.push(body.id)
  }
  const replies = await Promise.all(ids.map(id => manager.post(`/api/runs/${id}/approve`)))
  const states = await statesOf(manager, ids)
  return { statuses: replies.map(reply => reply.status), states }
}

async function statesOf(manager: ApiClient, ids: string[]): Promise<string[]> {
  return Promise.all(ids.map(async id => (await manager.get<RunDetail>(`/api/runs/${id}`)).body.state))
}

function expectOneWinner({ statuses, states }: { statuses: number[], states: string[] }) {
  expect(statuses.filter(status => status === 200)).toHaveLength(1)
  expect(statuses.filter(status => status === 409)).toHaveLength(REQUESTS - 1)
  expect(states.filter(state => state === 'approved')).toHaveLength(1)
  expect(states.filter(state => state === 'asked')).toHaveLength(REQUESTS - 1)
}

describe('fifty approvals of overlapping runs at once leave exactly one approved, with no 5xx', () => {
  let postgres: TestPostgres
  const servers: StartedServer[] = []

  beforeAll(async () => {
    postgres = await startPostgres()
  })
  afterAll(async () => {
    for (const server of servers) await server.stop()
    await postgres.stop()
  })

  it('on PGlite', async () => {
    const server = await startServer()
    servers.push(server)
    expectOneWinner(await approveAllAtOnce(server))
  }, 180_000)

  it('on PostgreSQL', async () => {
    const server = await startServer({ databaseUrl: await createDatabase(postgres.adminUrl) })
    servers.push(server)
    expectOneWinner(await approveAllAtOnce(server))
  }, 240_000)
})
