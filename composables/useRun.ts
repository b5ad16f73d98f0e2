import type { RunDetail } from '#shared/types/runs'

/** A run by the id in the address, with its reload. */
export function useRun() {
  const route = useRoute()
  return useFetch<RunDetail>(() => `/api/runs/${String(route.params.runId)}`, { key: `run-${String(route.params.runId)}` })
}
