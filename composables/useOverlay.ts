import type { HeatCapacityCurve, LowTemperatureFit } from '#shared/heat-capacity/types'
import type { AnalysisView, CurvePoints, DatasetView, ResultList } from '#shared/types/results'

/** What lies over the plot: the line of another analysis, or the points of another table of the same run. */
export function useOverlay(dataset: Ref<DatasetView | null | undefined>) {
  const analysisId = ref<string | null>(null)
  const datasetId = ref<string | null>(null)
  const others = shallowRef<{ id: string, label: string }[]>([])
  const fit = shallowRef<LowTemperatureFit | null>(null)
  const curve = shallowRef<HeatCapacityCurve | null>(null)
  const refusal = ref('')

  async function fetchOr<T>(url: string): Promise<T | null> {
    refusal.value = ''
    try {
      return await $fetch<T>(url) as T
    }
    catch {
      refusal.value = 'What was to be laid over the plot could not be loaded. Choose it again.'
      return null
    }
  }

  onMounted(async () => {
    const list = await fetchOr<ResultList>(`/api/results?runId=${dataset.value?.run.id}`)
    others.value = (list?.items ?? []).filter(item => item.mapped && item.role !== 'addenda' && item.datasetId !== dataset.value?.id).map(item => ({ id: item.datasetId, label: item.originalName }))
  })
  watch(analysisId, async (id) => {
    fit.value = id ? (await fetchOr<AnalysisView>(`/api/analyses/${id}`))?.result.fit ?? null : null
  })
  watch(datasetId, async (id) => {
    const points = id ? await fetchOr<CurvePoints>(`/api/datasets/${id}/points`) : null
    curve.value = points && { temperatureK: points.temperatureK, heatCapacity: points.heatCapacity, ...(points.sigma ? { sigma: points.sigma } : {}) }
  })

  const overlay = computed(() => fit.value || curve.value ? { label: others.value.find(each => each.id === datasetId.value)?.label ?? '', fit: fit.value, curve: curve.value } : null)
  return { analysisId, datasetId, others, overlay, refusal }
}
