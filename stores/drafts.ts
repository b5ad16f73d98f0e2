import { defineStore } from 'pinia'

/** What was typed and not yet taken by the server, by form; survives a reload and a new sign-in in the same tab. */
export const useDraftsStore = defineStore('drafts', () => {
  const keyOf = (form: string) => `holdtime-draft:${form}`

  function save(form: string, values: unknown) {
    if (import.meta.client) sessionStorage.setItem(keyOf(form), JSON.stringify(values))
  }

  function read<T>(form: string): Partial<T> | null {
    const text = import.meta.client ? sessionStorage.getItem(keyOf(form)) : null
    return text ? JSON.parse(text) as Partial<T> : null
  }

  function forget(form: string) {
    if (import.meta.client) sessionStorage.removeItem(keyOf(form))
  }

  return { save, read, forget }
})
