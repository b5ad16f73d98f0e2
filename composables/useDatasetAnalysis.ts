import { DomainError } from '#shared/errors'
import type { DatasetAnalysisInput, FittedCurve } from '#shared/heat-capacity/analyse-dataset'
import type { CorrectionSuggestion, FitTerm, HeatCapacityAnalysis, HeatCapacityCurve } from '#shared/heat-capacity/types'
import type { WindowAdvice } from '#shared/heat-capacity/window-advice'
import type { AnalysisView, CurvePoints, DatasetView } from '#shared/types/results'

type Engine = typeof import('#shared/heat-capacity/analyse-dataset') & typeof import('#shared/heat-capacity/window-advice')

const CHECK_AFTER_MS = 120
const toCurve = ({ temperatureK, heatCapacity, sigma, rowNumbers }: CurvePoints): HeatCapacityCurve => ({ temperatureK, heatCapacity, ...(sigma ? { sigma } : {}), ...(rowNumbers ? { rowNumbers } : {}) })

/**
 * The live analysis of a result page: the same engine as the server, loaded in the browser when it is needed. The fit follows
 * every change at once, the checks a moment later.
 *
 * @param dataset the dataset
 * @param points its points, once they are there
 * @param saved the analysis that is open; its choices are where one starts
 */
export function useDatasetAnalysis(dataset: Ref<DatasetView | null | undefined>, points: Ref<CurvePoints | null>, saved: Ref<AnalysisView | null | undefined>) {
  const engine = shallowRef<Engine | null>(null)
  const windowK = ref<readonly [number, number]>([0, 1])
  const terms = ref<FitTerm[]>(['gamma', 'beta3'])
  const addendaId = ref<string | null>(null)
  const correction = shallowRef<CorrectionSuggestion | null>(null)
  const holder = shallowRef<HeatCapacityCurve | undefined>()
  const isReady = ref(false)

  const fitted = shallowRef<FittedCurve | null>(null)
  const live = shallowRef<HeatCapacityAnalysis | null>(null)
  const advice = shallowRef<WindowAdvice | null>(null)
  const refusal = ref('')
  const adviceRefusal = ref('')

  // Apart from the choices, so that the plots do not draw the same points anew at every step of the window.
  const measured = computed(() => points.value && toCurve(points.value))
  const input = computed<DatasetAnalysisInput | null>(() => {
    const { mapping, copperStandard, checkThresholds } = dataset.value ?? {}
    if (!measured.value || !mapping?.sample) return null
    return {
      curve: measured.value, sample: mapping.sample, unit: mapping.columns.heatCapacity.unit, model: { terms: terms.value, windowK: windowK.value },
      holder: holder.value, correction: correction.value, standard: copperStandard ?? undefined, thresholds: checkThresholds ?? {},
    }
  })
  const curve = computed(() => fitted.value?.curve ?? input.value?.curve ?? null)

  /** A refusal of the engine is a sentence for the person; anything else is a fault. */
  function attempt<T>(work: () => T, refuse: (sentence: string) => void): T | null {
    try {
      return work()
    }
    catch (error) {
      if (!(error instanceof DomainError)) throw error
      refuse(error.message)
      return null
    }
  }

  function scan() {
    const { value: given } = input
    if (!given || !engine.value) return
    adviceRefusal.value = ''
    const { kind, criticalTemperatureK, atomsPerFormulaUnit } = given.sample
    const lowK = kind === 'superconductor' ? criticalTemperatureK : undefined
    advice.value = attempt(() => engine.value!.adviseWindow(engine.value!.netCurve({ ...given, model: { ...given.model, windowK: [0, 0] } }), { atomsPerFormulaUnit, lowK }), sentence => adviceRefusal.value = sentence)
  }

  function takeAdvice() {
    if (!advice.value) scan()
    if (!advice.value) return false
    windowK.value = advice.value.windowK
    terms.value = [...advice.value.terms]
    return true
  }

  /** Starts from the open analysis, else from the advice, else from all points. */
  function start() {
    const { value: view } = saved
    const temperatures = points.value?.temperatureK ?? []
    advice.value = null
    correction.value = view?.lineage.correction ?? null
    addendaId.value = view?.lineage.addenda?.datasetId ?? null
    if (view) [windowK.value, terms.value] = [view.lineage.windowK, [...view.result.fit.model.terms]]
    else if (!takeAdvice()) windowK.value = [temperatures[0] ?? 0, temperatures.at(-1) ?? 1]
    isReady.value = true
  }

  watch(addendaId, async (id) => {
    const given = id ? await $fetch<CurvePoints | null>(`/api/datasets/${id}/points`).catch(() => null) : null
    if (id && !given) refusal.value = 'The addenda could not be loaded. Check the connection and choose them again.'
    holder.value = given ? toCurve(given) : undefined
  })

  let timer: ReturnType<typeof setTimeout> | undefined
  watch([input, isReady], () => {
    const { value: given } = input
    if (!given || !engine.value || !isReady.value) return
    refusal.value = ''
    fitted.value = attempt(() => engine.value!.fitDataset(given), sentence => refusal.value = sentence)
    clearTimeout(timer)
    timer = setTimeout(() => live.value = attempt(() => engine.value!.analyseDataset(given), sentence => refusal.value = sentence), CHECK_AFTER_MS)
  })
  onScopeDispose(() => clearTimeout(timer))

  async function loadEngine() {
    const [analysis, windows] = await Promise.all([import('#shared/heat-capacity/analyse-dataset'), import('#shared/heat-capacity/window-advice')])
    engine.value = { ...analysis, ...windows }
  }
  // By id: a new remark on the open analysis must not move the window that a person is trying.
  watch([points, () => saved.value?.id, engine], () => {
    if (points.value && engine.value) start()
    else if (points.value && import.meta.client) void loadEngine()
  })

  /** Whether what is on the screen is the open analysis. */
  const isSaved = computed(() => {
    const { value: view } = saved
    if (!view || !isReady.value) return !isReady.value
    const { windowK: [low, high], correction: accepted, addenda } = view.lineage
    return low === windowK.value[0] && high === windowK.value[1] && (accepted?.id ?? null) === (correction.value?.id ?? null) && (addenda?.datasetId ?? null) === addendaId.value
      && view.restsOnCurrentCurve && [...view.result.fit.model.terms].sort().join() === [...terms.value].sort().join()
  })

  return { windowK, terms, addendaId, correction, fitted, curve, live, advice, refusal, adviceRefusal, isReady, isSaved, scan, takeAdvice }
}
