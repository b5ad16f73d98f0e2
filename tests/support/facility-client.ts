import type { PlanOptions } from '#shared/types/plan'
import type { RunDetail } from '#shared/types/runs'
import type { SampleSheet } from '#shared/types/samples'
import type { ApiClient } from './client'

const DAY_MS = 86_400_000
let daysAhead = 60

/** A plan on a cryostat with a sample of the client's own, on days that no other test uses. */
export async function planOf(client: ApiClient, slug: string, changes: Record<string, unknown> = {}) {
  const options = (await client.get<PlanOptions>('/api/cryostats')).body
  const sample = (await client.get<SampleSheet[]>('/api/samples')).body[0]!
  const cryostat = options.cryostats.find(candidate => candidate.slug === slug)!
  daysAhead += 12
  const startsAt = new Date(Date.now() + daysAhead * DAY_MS)
  startsAt.setUTCHours(8, 0, 0, 0)
  return {
    cryostatId: cryostat.id, groupId: sample.groupId, sampleIds: [sample.id], title: 'Test run', temperatureLowK: Math.max(4, cryostat.baseTemperatureK * 1.1), temperatureHighK: 12, points: 12, nitrogenPrecool: cryostat.nitrogenPrecool, sweeps: 0,
    startsAt: startsAt.toISOString(), clientKey: crypto.randomUUID(), ...changes,
  }
}

/** Asks for a run and gives its id. */
export async function askedRun(client: ApiClient, slug: string, changes: Record<string, unknown> = {}): Promise<string> {
  const reply = await client.post<{ id: string }>('/api/runs', await planOf(client, slug, changes))
  if (reply.status !== 201) throw new Error(`asking failed: ${JSON.stringify(reply.body)}`)
  return reply.body.id
}

/** A run as its page shows it. */
export async function readRunAs(client: ApiClient, runId: string): Promise<RunDetail> {
  return (await client.get<RunDetail>(`/api/runs/${runId}`)).body
}

/** Does on the payment fake's hosted page what a payer would. */
export async function onPayPage(checkoutUrl: string, choice: 'pay' | 'decline' | 'challenge' | 'confirm' | 'refuse') {
  return fetch(checkoutUrl, { method: 'POST', redirect: 'manual', headers: { 'content-type': 'application/x-www-form-urlencoded' }, body: `do=${choice}` })
}
