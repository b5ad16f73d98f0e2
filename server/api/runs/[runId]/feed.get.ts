import { createEventStream } from 'h3'
import { runParams } from '#shared/schemas/run'
import { readRun } from '#server/services/runs/queries'
import { defineApi } from '#server/utils/define-api'
import { onRunChange } from '#server/utils/run-changes'

const KEEP_ALIVE_MS = 25_000

/** Server-sent events: one `changed` for every change of the run or its sheet. */
export default defineApi({ access: 'run:read', params: runParams }, async ({ event, db, actor, params }) => {
  await readRun(db, { runId: params.runId, actor })
  const stream = createEventStream(event)
  // A reader that is gone has no socket left, and the server's idle count would look for it when the answer ends.
  event.node.req.once('close', () => event.node.res.removeAllListeners('finish'))
  const stopListening = onRunChange(params.runId, () => void stream.push({ event: 'changed', data: params.runId }))
  const keepAlive = setInterval(() => void stream.push({ event: 'alive', data: '' }), KEEP_ALIVE_MS)
  stream.onClosed(async () => {
    stopListening()
    clearInterval(keepAlive)
    await stream.close()
  })
  return stream.send()
})
