import type { AnalysisView, CurvePoints, DatasetView, TablePreview } from '#shared/types/results'

/**
 * What a result page shows: the dataset with the analysis that is open (on the server too), and, in the browser, its points.
 * The points may be half a million and are not sent with the page.
 */
export async function useDatasetPage() {
  const route = useRoute()
  const datasetId = computed(() => String(route.params.datasetId))
  const at = (path = '') => `/api/datasets/${datasetId.value}${path}`

  const { data: dataset, error, refresh } = await useFetch<DatasetView>(() => at('?points=no'), { key: `dataset-${datasetId.value}` })
  const openId = computed(() => typeof route.query.analysis === 'string' ? route.query.analysis : dataset.value?.analyses[0]?.id ?? null)
  const { data: analysis, refresh: refreshAnalysis } = await useAsyncData<AnalysisView | null>(
    `analysis-of-${datasetId.value}`,
    async () => openId.value ? await useRequestFetch()<AnalysisView>(`/api/analyses/${openId.value}`) : null,
    { watch: [openId] },
  )

  const points = shallowRef<CurvePoints | null>(null)
  const preview = shallowRef<TablePreview | null>(null)
  const loadFailed = ref(false)
  async function load() {
    loadFailed.value = false
    try {
      points.value = dataset.value?.mapping ? await $fetch<CurvePoints | null>(at('/points')) : null
      if (!dataset.value?.mapping) await loadPreview()
    }
    catch {
      loadFailed.value = true
    }
  }
  async function loadPreview() {
    preview.value ??= await $fetch<TablePreview>(at('/preview'))
  }
  onMounted(load)

  /** After the columns were confirmed or an analysis was saved. */
  async function reload({ withPoints = false } = {}) {
    await refresh()
    await refreshAnalysis()
    if (withPoints) await load()
  }

  return { dataset, error, analysis, openId, points, preview, loadFailed, load, loadPreview, reload, refreshAnalysis }
}
