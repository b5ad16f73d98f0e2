import type { AnalysisView, DatasetView } from '#shared/types/results'
import type { useDatasetAnalysis } from '~/composables/useDatasetAnalysis'

/** What a person does on a result page: save the analysis, put rows back, remark. */
export function useDatasetActions(
  dataset: Ref<DatasetView | null | undefined>,
  analysis: Ref<AnalysisView | null | undefined>,
  live: ReturnType<typeof useDatasetAnalysis>,
  reload: (what?: { withPoints?: boolean }) => Promise<void>,
) {
  const saving = useSubmit()
  const rows = useSubmit()
  const remarking = useSubmit()
  const remark = ref('')

  async function save() {
    const body = { model: { terms: live.terms.value, windowK: live.windowK.value }, addendaDatasetId: live.addendaId.value, correctionId: live.correction.value?.id ?? null }
    const reply = await saving.submit<{ analysisId: string }>(`/api/datasets/${dataset.value?.id}/analyses`, { body, done: 'The analysis is saved.' })
    if (!reply) return
    await navigateTo({ query: { analysis: reply.analysisId } }, { replace: true })
    await reload()
  }

  async function changeRows(restoredRows: number[]) {
    const { mapping, sampleId, id } = dataset.value ?? {}
    if (!mapping) return
    const { molarMassGPerMol: _, atomsPerFormulaUnit: __, ...sample } = mapping.sample ?? {}
    const body = { columns: mapping.columns, sampleId, restoredRows, ...(mapping.sample ? { sample } : {}) }
    if (await rows.submit(`/api/datasets/${id}/mapping`, { method: 'PUT', body })) await reload({ withPoints: true })
  }

  async function sendRemark(text: string) {
    if (!await remarking.submit(`/api/analyses/${analysis.value?.id}/comments`, { body: { text } })) return
    remark.value = ''
    await reload()
  }

  return { saving, rows, remarking, remark, save, changeRows, sendRemark }
}
