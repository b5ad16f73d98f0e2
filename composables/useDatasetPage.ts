import type { AnalysisView, CurvePoints, DatasetView, TablePreview } from '#shared/types/results'

/**
 * What a result page shows: the dataset with the analysis that is open (on the server too), and, in the browser, its points.
 * The points may be half a million and are not sent with the page. `first` resolves with the first answer.
 */
export function useDatasetPage() {
  const route = useRoute()
  const fetchOnServer = useRequestFetch()
  const datasetId = String(route.params.datasetId)
  const at = (path = '') => `/api/datasets/${datasetId}${path}`
  const wantedId = computed(() => typeof route.query.analysis === 'string' ? route.query.analysis : null)

  const request = useAsyncData(`dataset-${datasetId}`, async () => {
    const dataset = await fetchOnServer<DatasetView>(at('?points=no'))
    const openId = wantedId.value ?? dataset.analyses[0]?.id ?? null
    return { dataset, openId, analysis: openId ? await fetchOnServer<AnalysisView>(`/api/analyses/${openId}`) : null }
  }, { watch: [wantedId], deep: false })
  const { data, error } = request
  const dataset = computed(() => data.value?.dataset ?? null)
  const analysis = computed(() => data.value?.analysis ?? null)
  const openId = computed(() => data.value?.openId ?? null)

  const points = shallowRef<CurvePoints | null>(null)
  const preview = shallowRef<TablePreview | null>(null)
  const loadFailed = ref(false)
  async function load() {
    loadFailed.value = false
    try {
      if (dataset.value?.mapping) points.value = await $fetch<CurvePoints | null>(at('/points'))
      else await loadPreview()
    }
    catch {
      loadFailed.value = true
    }
  }
  async function loadPreview() {
    preview.value ??= await $fetch<TablePreview>(at('/preview'))
  }
  // On a client navigation the first answer may come after mounting.
  onMounted(() => watch(() => dataset.value?.id, id => id && load(), { immediate: true }))

  /** After the columns were confirmed or an analysis was saved. */
  async function reload({ withPoints = false } = {}) {
    await request.refresh()
    if (withPoints) await load()
  }

  return { first: request, dataset, error, analysis, openId, points, preview, loadFailed, load, loadPreview, reload }
}
