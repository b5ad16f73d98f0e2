import type { FormContext } from 'vee-validate'
import { ref } from 'vue'
import { type Refusal, refusalSentence, refusedFields } from '#shared/utils/refusal-words'
import { useToastsStore } from '~/stores/toasts'

/** How a form is sent. */
export interface SubmitOptions {
  method?: 'POST' | 'PUT' | 'DELETE'
  body?: Record<string, unknown>
  /** The form whose fields take what the server refuses. */
  form?: Pick<FormContext, 'setErrors'>
  /** Said in a toast when it is done. */
  done?: string
}

/**
 * Sends a form: once at a time, with what the server refuses put at its fields, and a sentence for a lost connection or
 * an ended session. What was typed is never touched.
 *
 * @returns `submit`, which resolves with the reply or null when refused; `busy`; and `refusal`, the sentence to show (BaseRefusal)
 */
export function useSubmit() {
  const busy = ref(false)
  const refusal = ref('')
  const toasts = useToastsStore()

  async function submit<T = unknown>(url: string, { method = 'POST', body = {}, form, done }: SubmitOptions = {}): Promise<T | null> {
    if (busy.value) return null
    busy.value = true
    refusal.value = ''
    try {
      const reply = await $fetch<T>(url, { method, body: method === 'DELETE' ? undefined : body, retry: 0 })
      if (done) toasts.show(done)
      return reply as T
    }
    catch (error) {
      const { statusCode, data } = error as { statusCode?: number, data?: Refusal }
      refusal.value = refusalSentence(statusCode, data)
      form?.setErrors(refusedFields(data))
      return null
    }
    finally {
      busy.value = false
    }
  }

  return { submit, busy, refusal }
}
