import type { ResultListQuery } from '#shared/schemas/results'
import type { ResultList } from '#shared/types/results'

/** The list of results with its filters; further pages are added below the first. */
export function useResultList() {
  const filters = reactive<Pick<ResultListQuery, 'verdict' | 'signed' | 'search'>>({ verdict: undefined, signed: undefined, search: undefined })
  const query = computed(() => Object.fromEntries(Object.entries(filters).filter(([, value]) => value)))
  const { data, status, error, refresh } = useFetch<ResultList>('/api/results', { query, key: 'results' })
  const more = ref<ResultList[]>([])
  watch(data, () => more.value = [])

  const items = computed(() => [...data.value?.items ?? [], ...more.value.flatMap(page => page.items)])
  const timeZone = computed(() => data.value?.timeZone ?? 'UTC')
  const nextCursor = computed(() => (more.value.at(-1) ?? data.value)?.nextCursor ?? null)
  async function loadMore() {
    if (nextCursor.value) more.value.push(await $fetch<ResultList>('/api/results', { query: { ...query.value, cursor: nextCursor.value } }))
  }

  return { filters, items, nextCursor, loadMore, timeZone, status, error, refresh }
}
