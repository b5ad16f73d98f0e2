import { execFileSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { beforeAll, describe, expect, inject, it } from 'vitest'
import type { InvoiceDetail } from '#shared/types/invoices'
import type { RunSheet } from '#shared/types/runs'
import { type ApiClient, signedInClient } from '../support/client'
import { askedRun, onPayPage, planOf, readRunAs } from '../support/facility-client'
import { eventually } from '../support/wait'

let user: ApiClient
let internal: ApiClient
let pi: ApiClient
let manager: ApiClient
let operator: ApiClient

beforeAll(async () => {
  user = await signedInClient('visiting user, Alder')
  internal = await signedInClient('visiting user, Birch')
  pi = await signedInClient('PI, Alder')
  manager = await signedInClient('manager')
  operator = await signedInClient('operator')
})

/** Mails that the fake received for an address, newest first. */
async function mailsTo(address: string): Promise<{ subject: string }[]> {
  const all = await (await fetch(`${inject('server').mailUrl}/api/email`)).json() as { subject: string, to: { address: string }[] }[]
  return all.filter(mail => mail.to.some(to => to.address === address))
}

async function paidRun(slug = 'petrel'): Promise<string> {
  const runId = await askedRun(user, slug, { startsAt: new Date(Date.now() + 2 * 3_600_000 + Math.random() * 3_600_000).toISOString() }).catch(() => askedRun(user, slug))
  expect((await manager.post(`/api/runs/${runId}/approve`)).status).toBe(200)
  const { body } = await user.post<{ checkoutUrl: string }>(`/api/runs/${runId}/deposit`)
  await onPayPage(body.checkoutUrl, 'pay')
  await eventually(() => readRunAs(user, runId), run => run.state === 'confirmed')
  return runId
}

describe('asking', () => {
  it('asks once when the button is pressed twice', async () => {
    const plan = await planOf(user, 'petrel')
    const [first, second] = await Promise.all([user.post<{ id: string }>('/api/runs', plan), user.post<{ id: string }>('/api/runs', plan)])
    expect(first.body.id).toBe(second.body.id)
  })

  it('refuses a start in the past, at its field, with the remedy', async () => {
    const reply = await user.post<{ message: string, data: { issues: { path: string[], message: string }[] } }>('/api/runs', await planOf(user, 'petrel', { startsAt: '2020-01-01T08:00:00Z' }))
    expect(reply.status).toBe(422)
    expect(reply.body.data.issues).toEqual([{ path: ['startsAt'], message: 'This start is in the past. Choose a later day.' }])
  })

  it('refuses days that a run holds, naming it, before and after', async () => {
    const held = await paidRunAhead()
    const plan = await planOf(user, 'fulmar', { startsAt: held.startsAt })
    const { clientKey: _, title: __, ...estimate } = plan
    const before = await user.post<{ conflicts: { label: string }[] }>('/api/plan/estimate', estimate)
    expect(before.body.conflicts.map(conflict => conflict.label)).toEqual([`run ${String(held.number).padStart(4, '0')}`])
    const after = await user.post<{ message: string }>('/api/runs', plan)
    expect(after.status).toBe(409)
    expect(after.body.message).toContain(`held by run ${String(held.number).padStart(4, '0')}`)
  })

  async function paidRunAhead() {
    const runId = await askedRun(internal, 'fulmar', { costCode: 'SK-4410' })
    expect((await manager.post(`/api/runs/${runId}/approve`)).status).toBe(200)
    return readRunAs(manager, runId)
  }
})

describe('deciding', () => {
  it('confirms an internal run at once, and tells the group by mail', async () => {
    const runId = await askedRun(internal, 'puffin', { costCode: 'SK-4477' })
    expect((await manager.post<{ state: string }>(`/api/runs/${runId}/approve`)).body.state).toBe('confirmed')
    const { number } = await readRunAs(internal, runId)
    await eventually(() => mailsTo('jonas@birch.example'), mails => mails.some(mail => mail.subject === `Run ${String(number).padStart(4, '0')} is confirmed`))
  })

  it('refuses a cost code that is not the group\'s', async () => {
    const reply = await internal.post<{ data: { issues: { path: string[] }[] } }>('/api/runs', await planOf(internal, 'puffin', { costCode: 'XX-1' }))
    expect([reply.status, reply.body.data.issues[0]?.path]).toEqual([422, ['costCode']])
  })

  it('declines only with a reason', async () => {
    const runId = await askedRun(user, 'petrel')
    expect((await manager.post(`/api/runs/${runId}/decline`, { reason: '' })).status).toBe(422)
    expect((await manager.post<{ state: string }>(`/api/runs/${runId}/decline`, { reason: 'The insert is in repair.' })).body.state).toBe('declined')
    expect((await manager.post(`/api/runs/${runId}/approve`)).status).toBe(409)
  })
})

describe('paying', () => {
  it('keeps one checkout however often the button is pressed, and confirms by the signed event alone', async () => {
    const runId = await askedRun(user, 'petrel')
    await manager.post(`/api/runs/${runId}/approve`)
    const [first, second] = [await user.post<{ checkoutUrl: string }>(`/api/runs/${runId}/deposit`), await user.post<{ checkoutUrl: string }>(`/api/runs/${runId}/deposit`)]
    expect(first.body.checkoutUrl).toBe(second.body.checkoutUrl)
    await onPayPage(first.body.checkoutUrl, 'decline')
    expect((await readRunAs(user, runId)).state).toBe('approved')
    await onPayPage(first.body.checkoutUrl, 'challenge')
    await onPayPage(`${first.body.checkoutUrl}/challenge`, 'confirm')
    await eventually(() => readRunAs(user, runId), run => run.state === 'confirmed')
    expect((await user.post(`/api/runs/${runId}/deposit`)).status).toBe(409)
  })

  it('takes no event whose signature does not fit', async () => {
    const reply = await fetch(`${inject('server').origin}/api/payments/webhook`, { method: 'POST', headers: { 'stripe-signature': 't=1,v1=00' }, body: '{"id":"evt_forged"}' })
    expect(reply.status).toBe(400)
  })

  it('pays a deposit back when the run is withdrawn long before its start', async () => {
    const runId = await askedRun(user, 'petrel')
    await manager.post(`/api/runs/${runId}/approve`)
    const { body } = await user.post<{ checkoutUrl: string }>(`/api/runs/${runId}/deposit`)
    await onPayPage(body.checkoutUrl, 'pay')
    const paid = await eventually(() => readRunAs(user, runId), run => run.state === 'confirmed')
    expect((await user.post(`/api/runs/${runId}/withdraw`, { reason: 'The crystal broke.' })).status).toBe(200)
    const after = await eventually(() => readRunAs(user, runId), run => run.payments.some(payment => payment.kind === 'refund' && payment.state === 'succeeded'))
    expect(after.payments.find(payment => payment.kind === 'refund')?.amountMinor).toBe(paid.quote?.depositMinor)
  })
})

describe('running and closing', () => {
  it('logs, computes helium, finishes, charges the balance and makes a paper that says what was used', async () => {
    const runId = await startableRun()
    expect((await operator.post<{ state: string }>(`/api/runs/${runId}/start`)).body.state).toBe('running')
    const sheet = (await operator.get<RunSheet>(`/api/runs/${runId}/sheet`)).body
    const dewar = sheet.dewars.toSorted((a, b) => b.litres - a.litres)[0]!
    const at = new Date().toISOString()
    const record = (body: Record<string, unknown>) => operator.post<{ id: string, isRepeat: boolean, message?: string, data?: { issues: { path: string[], message: string }[] } }>(`/api/runs/${runId}/entries`, { at, clientKey: crypto.randomUUID(), ...body })
    for (const phase of ['prepare', 'cool-to-77', 'cool-to-base']) expect((await record({ kind: 'phase', phase })).status).toBe(200)
    expect((await record({ kind: 'phase', phase: 'prepare' })).status).toBe(409)

    const refused = await record({ kind: 'level', levelPercent: 140 })
    expect([refused.status, refused.body.data?.issues[0]?.message]).toEqual([422, 'Enter a level from 0 to 100 %.'])
    // 60 L drawn, level 0 → 50 % which is 24 L by Petrel's calibration: 36 L went to cooling and the line.
    const transfer = { kind: 'transfer', fromAccountId: dewar.id, startedAt: at, drawnLitres: 60, levelBeforePercent: 0, levelAfterPercent: 50, clientKey: crypto.randomUUID() }
    expect((await record(transfer)).status).toBe(200)
    expect((await record(transfer)).body.isRepeat).toBe(true)
    expect((await record({ kind: 'temperature', temperatureK: 4.21 })).status).toBe(200)
    expect((await record({ kind: 'phase', phase: 'measure' })).status).toBe(200)

    const logged = (await operator.get<RunSheet>(`/api/runs/${runId}/sheet`)).body
    expect(logged.helium?.usedLitres).toBeCloseTo(36, 5)
    expect((await operator.post(`/api/runs/${runId}/finish`, { operatorHours: 4, cutShort: false, reason: '' })).status).toBe(200)
    expect((await operator.post(`/api/runs/${runId}/finish`, { operatorHours: 4, cutShort: false, reason: '' })).status).toBe(409)

    const settled = await eventually(() => readRunAs(pi, runId), run => run.state === 'settled' && run.invoice !== null)
    const invoice = await eventually(async () => (await pi.get<InvoiceDetail>(`/api/invoices/${settled.invoice!.id}`)).body, reply => reply.pdfSha256 !== null)
    expect(invoice.lines.find(line => line.label === 'Liquid helium used')).toMatchObject({ quantity: 36, unit: 'L' })
    expect(invoice.lines.find(line => line.label === 'Operator')).toMatchObject({ quantity: 4 })
    expect(invoice.totalMinor - invoice.prepaidMinor).toBe(invoice.dueMinor)

    const paper = await fetch(`${inject('server').origin}/api/invoices/${invoice.id}/pdf`, { headers: { cookie: [...pi.cookies].map(pair => pair.join('=')).join('; ') } })
    expect(paper.headers.get('content-type')).toBe('application/pdf')
    const text = pdfText(Buffer.from(await paper.arrayBuffer()))
    for (const words of [`Invoice ${invoice.number}`, 'Skerry Low-Temperature Facility', 'Liquid helium used', '36.0 L', 'Deposit paid']) expect(text).toContain(words)
    await eventually(() => mailsTo('accounts@alder.example'), mails => mails.some(mail => mail.subject.startsWith(`Invoice ${invoice.number}`)))
  })

  /** A confirmed run of the Alder group that may be started now: Petrel is made free by finishing what runs on it. */
  async function startableRun(): Promise<string> {
    const running = (await manager.get<{ items: { id: string, cryostat: string }[] }>('/api/runs?state=running')).body.items.find(run => run.cryostat === 'Petrel')
    if (running) await operator.post(`/api/runs/${running.id}/finish`, { operatorHours: 1, cutShort: true, reason: 'Made free by a test.' })
    return paidRun()
  }
})

function pdfText(content: Buffer): string {
  const folder = mkdtempSync(join(tmpdir(), 'holdtime-pdf-'))
  try {
    writeFileSync(join(folder, 'paper.pdf'), content)
    // Thin and no-break spaces of amounts come as plain ones, so that words can be compared.
    return execFileSync('pdftotext', ['-layout', join(folder, 'paper.pdf'), '-'], { encoding: 'utf8' }).replace(/[\u2009\u00A0\u202F]/g, ' ')
  }
  finally {
    rmSync(folder, { recursive: true })
  }
}
