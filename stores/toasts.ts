import { defineStore } from 'pinia'
import { ref } from 'vue'

/** One short message. */
export interface Toast { id: number, text: string, tone: 'ok' | 'caution' | 'fail' }

const SHOWN_MS = 8000

/** Messages that outlive the page that raised them. Failures stay until they are dismissed. */
export const useToastsStore = defineStore('toasts', () => {
  const shown = ref<Toast[]>([])
  let nextId = 1

  function dismiss(id: number) {
    shown.value = shown.value.filter(toast => toast.id !== id)
  }

  function show(text: string, tone: Toast['tone'] = 'ok') {
    const id = nextId++
    shown.value = [...shown.value, { id, text, tone }]
    if (tone !== 'fail') setTimeout(() => dismiss(id), SHOWN_MS)
  }

  return { shown, show, dismiss }
})
