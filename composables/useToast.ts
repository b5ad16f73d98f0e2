import { useToastsStore } from '~/stores/toasts'

/** Short messages: `ok('Reading recorded.')`, `caution(…)`, `fail(…)`; those of failure stay until dismissed. */
export function useToast() {
  const toasts = useToastsStore()
  return {
    ok: (text: string) => toasts.show(text, 'ok'),
    caution: (text: string) => toasts.show(text, 'caution'),
    fail: (text: string) => toasts.show(text, 'fail'),
  }
}
