import { toTypedSchema } from '@vee-validate/zod'
import { useForm } from 'vee-validate'
import { onBeforeUnmount, onMounted, watch } from 'vue'
import type { ZodTypeAny } from 'zod'
import { useSubmit } from '~/composables/useSubmit'
import { useDraftsStore } from '~/stores/drafts'

/** How a form with a draft is set up. */
export interface DraftFormOptions {
  /** What the fields hold at first. */
  initial?: Record<string, unknown>
  /** Name under which what is typed is kept in this tab until it was taken, e.g. `run-0218-entry`; none keeps nothing. */
  draft?: string
}

const SAVE_AFTER_MS = 300

/**
 * A form checked by the schema that its route uses too, kept as a draft while it is typed, so that a lost connection, a
 * reload or an ended session loses nothing.
 *
 * @example
 * const { send, busy, refusal } = useDraftForm(entrySchema, { draft: `run-${id}-entry` })
 * const submit = send(`/api/runs/${id}/entries`, { done: 'Reading recorded.' }, () => refresh())
 *
 * @returns vee-validate's form; `send(url, options, after)`, which makes a submit handler; `busy`; `refusal`; `forget`, which drops the draft
 */
export function useDraftForm(schema: ZodTypeAny, { initial = {}, draft }: DraftFormOptions = {}) {
  const form = useForm({ validationSchema: toTypedSchema(schema), initialValues: initial })
  const { submit, busy, refusal } = useSubmit()
  const drafts = useDraftsStore()

  let timer: ReturnType<typeof setTimeout> | undefined
  const keep = () => draft && drafts.save(draft, form.values)
  function forget() {
    clearTimeout(timer)
    timer = undefined
    if (draft) drafts.forget(draft)
  }

  if (draft) {
    // After hydration, for the server knows no drafts.
    onMounted(() => {
      const kept = drafts.read(draft)
      if (kept) form.setValues(kept, false)
      watch(form.values, () => {
        clearTimeout(timer)
        timer = setTimeout(keep, SAVE_AFTER_MS)
      }, { deep: true })
    })
    onBeforeUnmount(() => {
      if (timer !== undefined) keep()
      clearTimeout(timer)
    })
  }

  function send<T = unknown>(url: string | (() => string), options: { method?: 'POST' | 'PUT', done?: string, body?: (values: Record<string, unknown>) => Record<string, unknown> } = {}, after?: (reply: T) => unknown) {
    return form.handleSubmit(async (values) => {
      const reply = await submit<T>(typeof url === 'string' ? url : url(), { ...options, body: options.body?.(values) ?? values, form })
      if (reply === null) return void keep()
      forget()
      await after?.(reply)
    })
  }

  return { ...form, send, busy, refusal, forget }
}
