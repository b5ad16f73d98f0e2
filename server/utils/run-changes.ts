import { beforeDatabaseCloses, databaseReady } from './database'

const listeners = new Map<string, Set<() => void>>()
let listening: Promise<() => Promise<void>> | undefined

/** Calls back whenever a run or its sheet changes, whichever process changed it (LISTEN/NOTIFY). Returns a function that stops. */
export function onRunChange(runId: string, listener: () => void): () => void {
  listening ??= databaseReady().then(open => open.listen('holdtime_run', payload => listeners.get(payload)?.forEach(call => call())))
  const ofRun = listeners.get(runId) ?? new Set()
  listeners.set(runId, ofRun.add(listener))
  return () => {
    ofRun.delete(listener)
    if (ofRun.size === 0) listeners.delete(runId)
  }
}

beforeDatabaseCloses(async () => {
  const stop = await listening
  await stop?.()
})
