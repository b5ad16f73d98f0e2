import { mapDatasetSchema } from '#shared/schemas/results'
import type { DatasetView, MappingReply, SampleChoice, TablePreview } from '#shared/types/results'

/** The facts of a sample as the form holds them: null while empty. */
function factsOf(sample: Partial<SampleChoice> & { volumeMm3?: number }) {
  const { formula = '', kind = 'unknown', massMg = null, massUncertaintyMg = null, densityGPerCm3 = null, volumeMm3 = null, conductionElectrons = null, criticalTemperatureK = null } = sample
  return { formula, kind, massMg, massUncertaintyMg, densityGPerCm3, volumeMm3, conductionElectrons, criticalTemperatureK }
}

const COPPER = { formula: 'Cu', kind: 'metal', conductionElectrons: 1 } as const

/**
 * The form of columns, units and sample facts, filled from what stands, else from the last table with the same heads, else
 * from what the heads say.
 *
 * @param dataset the dataset
 * @param preview the beginning of its table
 * @param onDone called when the columns are confirmed
 */
export function useMappingForm(dataset: DatasetView, preview: TablePreview, onDone: (reply: MappingReply) => unknown) {
  const { mapping, sampleChoices, role } = dataset
  const chosenSample = sampleChoices.find(choice => choice.id === dataset.sampleId) ?? (role === 'copper-standard' || sampleChoices.length !== 1 ? undefined : sampleChoices[0])
  const form = useDraftForm(mapDatasetSchema, {
    draft: `mapping-${dataset.id}`,
    initial: {
      columns: mapping?.columns ?? preview.remembered?.columns ?? { temperature: preview.suggested.temperature, heatCapacity: preview.suggested.heatCapacity, sigma: preview.suggested.sigma },
      sampleId: chosenSample?.id ?? null,
      sample: role === 'addenda' ? undefined : mapping?.sample ? factsOf(mapping.sample) : factsOf(chosenSample ?? (role === 'copper-standard' ? COPPER : {})),
      restoredRows: dataset.rejectedRows.filter(row => row.restored).map(row => row.row),
    },
  })
  const submit = form.send<MappingReply>(`/api/datasets/${dataset.id}/mapping`, { method: 'PUT', done: 'The columns are confirmed.' }, onDone)

  /** Another sample brings its own facts; nothing typed is lost when none is chosen. */
  function chooseSample(sampleId: string | null) {
    form.setFieldValue('sampleId', sampleId)
    const choice = sampleChoices.find(each => each.id === sampleId)
    if (choice) form.setFieldValue('sample', factsOf(choice))
  }

  return { values: form.values, busy: form.busy, refusal: form.refusal, submit, chooseSample }
}
