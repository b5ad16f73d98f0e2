/** Calls back when the server says that a run changed: an event stream, reopened by the browser when it breaks. */
export function useRunFeed(runId: () => string, onChange: () => void) {
  onMounted(() => {
    const source = new EventSource(`/api/runs/${runId()}/feed`)
    source.addEventListener('changed', onChange)
    onScopeDispose(() => source.close())
  })
}
