import type { DatasetRole } from '#shared/types/results'

/** One file on its way to the server. */
export interface UploadItem {
  key: string
  name: string
  bytes: number
  sentShare: number
  state: 'waiting' | 'sending' | 'reading' | 'done' | 'failed' | 'cancelled'
  message: string
  datasetId: string | null
}

interface UploadReply { datasetId: string, existed: boolean }

const LIMIT_BYTES = 50_000_000

/**
 * Uploads tables to a run one after another, each with progress and cancel; a failed file stays in the list with its
 * sentence and can be sent again without choosing it anew.
 *
 * @param runId the run
 */
export function useDatasetUpload(runId: string) {
  const items = ref<UploadItem[]>([])
  const files = new Map<string, { file: File, role: DatasetRole }>()
  const requests = new Map<string, XMLHttpRequest>()
  const busy = computed(() => items.value.some(item => item.state === 'sending' || item.state === 'reading' || item.state === 'waiting'))

  async function add(list: Iterable<File>, role: DatasetRole) {
    const added = [...list].map((file) => {
      const key = crypto.randomUUID()
      files.set(key, { file, role })
      const tooLarge = file.size > LIMIT_BYTES
      items.value.push({ key, name: file.name, bytes: file.size, sentShare: 0, state: tooLarge ? 'failed' : 'waiting', message: tooLarge ? 'This file is larger than 50 MB. Split it, or leave out what is not needed.' : '', datasetId: null })
      return tooLarge ? null : key
    })
    for (const key of added) if (key && items.value.find(item => item.key === key)?.state === 'waiting') await send(key)
  }

  async function send(key: string) {
    const item = items.value.find(each => each.key === key)
    const chosen = files.get(key)
    if (!item || !chosen || item.state === 'done') return
    Object.assign(item, { state: 'sending', sentShare: 0, message: '' })
    const form = new FormData()
    form.append('role', chosen.role)
    form.append('file', chosen.file)
    // fetch tells nothing of what was sent so far.
    const request = new XMLHttpRequest()
    requests.set(key, request)
    request.upload.addEventListener('progress', event => item.sentShare = event.lengthComputable ? event.loaded / event.total : 0)
    request.upload.addEventListener('load', () => Object.assign(item, { state: 'reading', sentShare: 1 }))
    request.addEventListener('abort', () => Object.assign(item, { state: 'cancelled', message: 'Cancelled; nothing was kept.' }))
    request.open('POST', `/api/runs/${runId}/datasets`)
    request.responseType = 'json'
    await new Promise<void>((resolve) => {
      request.addEventListener('loadend', () => {
        if (item.state !== 'cancelled') Object.assign(item, outcomeOf(request))
        resolve()
      })
      request.send(form)
    })
    requests.delete(key)
  }

  function cancel(key: string) {
    const item = items.value.find(each => each.key === key)
    if (item?.state === 'waiting') item.state = 'cancelled'
    requests.get(key)?.abort()
  }

  onScopeDispose(() => requests.forEach(request => request.abort()))

  return { items, busy, add, retry: send, cancel }
}

function outcomeOf(request: XMLHttpRequest): Partial<UploadItem> {
  if (request.status === 201) {
    const reply = request.response as UploadReply
    return { state: 'done', datasetId: reply.datasetId, message: reply.existed ? 'This file is on the run already; it was not added twice.' : '' }
  }
  if (request.status === 0) return { state: 'failed', message: 'The connection was lost. Press "Send again" when it is back.' }
  const body = request.response as { message?: string } | null
  return { state: 'failed', message: body?.message ?? 'The server did not take this file. Press "Send again".' }
}
