import { createHash } from 'node:crypto'
import { readFile } from 'node:fs/promises'
import { beforeAll, describe, expect, inject, it } from 'vitest'
import type { HeatCapacityReport } from '#shared/heat-capacity/report-json'
import type { AnalysisView, CurvePoints, DatasetView, ResultList } from '#shared/types/results'
import type { RunList } from '#shared/types/runs'
import { type ApiClient, anonymousClient, signedInClient } from '../support/client'

const reference = async (file: string) => new Uint8Array(await readFile(new URL(`../reference/data/heat-capacity/${file}`, import.meta.url)))
const OXIDE_MAPPING = { columns: { temperature: { column: 0, unit: 'K' }, heatCapacity: { column: 1, unit: 'J/(mol K)' } }, sample: { formula: 'Dy2O3', kind: 'insulator' } }

function formOf(content: BlobPart, name: string, role = 'measurement') {
  const form = new FormData()
  form.append('role', role)
  form.append('file', new Blob([content]), name)
  return form
}

describe('results over HTTP', () => {
  let user: ApiClient
  let pi: ApiClient
  let runId: string

  beforeAll(async () => {
    user = await signedInClient('visiting user, Alder')
    pi = await signedInClient('PI, Alder')
    const { body } = await user.get<RunList>('/api/runs?state=settled')
    runId = body.items[0]!.id
  })

  const upload = (content: BlobPart, name: string, role?: string) => user.request<{ datasetId: string, existed: boolean, message?: string }>('POST', `/api/runs/${runId}/datasets`, formOf(content, name, role))

  it('takes a measured table from the upload to the signature, and gives the file back byte for byte', async () => {
    const table = await reference('A_oxide_with_schottky_upturn_MIT.csv')
    const { status, body: { datasetId } } = await upload(table, 'oxide "µ" .csv')
    expect(status).toBe(201)
    expect((await upload(table, 'again.csv')).body).toEqual({ datasetId, existed: true })

    const file = await fetch(new URL(`/api/datasets/${datasetId}/file`, inject('server').origin), { headers: { cookie: [...user.cookies].map(pair => pair.join('=')).join('; ') } })
    expect(createHash('sha256').update(Buffer.from(await file.arrayBuffer())).digest('hex')).toBe(createHash('sha256').update(table).digest('hex'))
    expect(file.headers.get('content-disposition')).toBe('attachment; filename*=UTF-8\'\'oxide%20%22%C2%B5%22%20.csv')
    expect(file.headers.get('x-content-type-options')).toBe('nosniff')
    expect(file.headers.get('content-security-policy')).toContain('sandbox')

    expect((await user.request('PUT', `/api/datasets/${datasetId}/mapping`, OXIDE_MAPPING)).body).toMatchObject({ pointCount: 49, rejectedRows: [] })
    expect((await user.get<CurvePoints>(`/api/datasets/${datasetId}/points`)).body.temperatureK).toHaveLength(49)

    const save = (terms: string[]) => user.post<{ analysisId: string }>(`/api/datasets/${datasetId}/analyses`, { model: { terms, windowK: [1.8, 14.5] } })
    const plain = await save(['gamma', 'beta3'])
    expect(plain.status).toBe(201)
    const view = async (id: string) => (await user.get<AnalysisView>(`/api/analyses/${id}`)).body
    expect((await view(plain.body.analysisId)).result).toMatchObject({ verdict: 'fail' })
    const { body: { analysisId } } = await save(['gamma', 'beta3', 'tail'])
    const { gamma } = (await view(analysisId)).result.fit.coefficients
    expect(Math.abs(gamma!.value)).toBeLessThan(2 * gamma!.standardError)

    expect((await user.post(`/api/analyses/${analysisId}/sign-off`, { accepted: true, reason: 'Mine.' })).status).toBe(403)
    expect((await pi.post(`/api/analyses/${plain.body.analysisId}/sign-off`, { accepted: true, reason: 'Old.' })).status).toBe(409)
    expect((await pi.post(`/api/analyses/${analysisId}/sign-off`, { accepted: true, reason: 'The tail is nuclear.' })).status).toBe(201)
    expect((await user.post(`/api/analyses/${analysisId}/comments`, { text: 'Measured twice.' })).status).toBe(201)
    expect(await view(analysisId)).toMatchObject({ signOffs: [{ accepted: true, reason: 'The tail is nuclear.' }], comments: [{ text: 'Measured twice.' }] })
    const { body: list } = await user.get<ResultList>(`/api/results?runId=${runId}&signed=yes`)
    expect(list.items.find(item => item.datasetId === datasetId)?.latest).toMatchObject({ analysisId, signed: 'accepted' })
    expect((await user.get<DatasetView>(`/api/datasets/${datasetId}?points=no`)).body).toMatchObject({ pointCount: 49, points: null, analyses: [{ id: analysisId }, { id: plain.body.analysisId }] })
  })

  it('refuses what is no table with the sentence and the field, and more than 50 MB by counting', async () => {
    const noTable = await upload('once upon a time\nthere was a cryostat\n', 'tale.txt')
    expect(noTable.status).toBe(422)
    expect(noTable.body).toMatchObject({ data: { issues: [{ path: ['file'] }] } })
    expect((await upload(new Uint8Array([0x50, 0x4b, 3, 4, 0, 0]), 'sheet.xlsx')).body.message).toContain('Save the sheet as CSV')
    expect((await upload('', 'empty.csv')).status).toBe(422)
    expect((await upload('T/K,C\n1,2\n2,3\n', 'a.csv', 'gossip')).body).toMatchObject({ data: { issues: [{ path: ['role'] }] } })
    expect((await user.request('POST', `/api/runs/${runId}/datasets`, { file: 'x' })).status).toBe(422)
    expect((await upload('1,2\n'.repeat(13_000_000), 'long.csv')).status).toBe(413)
  })

  it('names the field of a mapping that does not do', async () => {
    const { body: { datasetId } } = await upload('T/K,C/(mJ/K)\n2,0.1\n3,0.2\n4,0.4\n', 'total.csv')
    const map = (mapping: object) => user.request<{ data?: { issues: { path: string[] }[] } }>('PUT', `/api/datasets/${datasetId}/mapping`, mapping)
    const columns = { temperature: { column: 0, unit: 'K' }, heatCapacity: { column: 1, unit: 'mJ/K' } }
    expect((await map({ columns, sample: { formula: 'Cu', kind: 'metal' } })).body.data!.issues[0]!.path).toEqual(['sample', 'massMg'])
    expect((await map({ columns, sample: { formula: 'Cu', kind: 'metal', massMg: -4 } })).status).toBe(422)
    expect((await user.post(`/api/datasets/${datasetId}/analyses`, { model: { terms: ['gamma', 'beta3'], windowK: [2, 4] } })).status).toBe(409)
    expect((await map({ columns, sample: { formula: 'Cu', kind: 'metal', massMg: 100 } })).status).toBe(200)
  })

  it('checks a table without storing it, from JSON and from a form alike, for whoever is signed in', async () => {
    const text = new TextDecoder().decode(await reference('A_oxide_with_schottky_upturn_MIT.csv'))
    const request = { sample: OXIDE_MAPPING.sample, model: { terms: ['gamma', 'beta3'], windowK: [1.8, 14.5] } }
    const before = (await user.get<ResultList>('/api/results')).body.items.length
    const json = await user.post<HeatCapacityReport>('/api/heat-capacity/check', { ...request, table: { text, mapping: OXIDE_MAPPING.columns } })
    expect(json.status).toBe(200)
    expect(json.body).toMatchObject({ verdict: 'fail', fit: { pointCount: 49 }, window: { low: 1.8, high: 14.5, chosenBy: 'given' } })
    const form = new FormData()
    form.append('request', JSON.stringify({ ...request, table: { mapping: OXIDE_MAPPING.columns } }))
    form.append('table', new Blob([text]), 'oxide.csv')
    expect((await user.request('POST', '/api/heat-capacity/check', form)).body).toEqual(json.body)
    expect((await user.get<ResultList>('/api/results')).body.items.length).toBe(before)
    expect((await anonymousClient().post('/api/heat-capacity/check', request)).status).toBe(401)
    expect((await user.post('/api/heat-capacity/check', { ...request, table: { text: 'no numbers' } })).status).toBe(422)
  })
})
