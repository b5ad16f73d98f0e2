import { defineStore } from 'pinia'

/** The tab's own store; none on the server. */
const storage = () => typeof sessionStorage === 'undefined' ? null : sessionStorage

/** What was typed and not yet taken by the server, by form; survives a reload and a new sign-in in the same tab. */
export const useDraftsStore = defineStore('drafts', () => {
  const keyOf = (form: string) => `holdtime-draft:${form}`

  function save(form: string, values: unknown) {
    storage()?.setItem(keyOf(form), JSON.stringify(values))
  }

  function read<T>(form: string): Partial<T> | null {
    const text = storage()?.getItem(keyOf(form))
    return text ? JSON.parse(text) as Partial<T> : null
  }

  function forget(form: string) {
    storage()?.removeItem(keyOf(form))
  }

  return { save, read, forget }
})
