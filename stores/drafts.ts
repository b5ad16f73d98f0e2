import { defineStore } from 'pinia'

const PREFIX = 'holdtime-draft:'

/** The tab's own store; none on the server. */
const storage = () => typeof sessionStorage === 'undefined' ? null : sessionStorage

/** What was typed and not yet taken by the server, by form; survives a reload and a new sign-in in the same tab. */
export const useDraftsStore = defineStore('drafts', () => {
  const keyOf = (form: string) => `${PREFIX}${form}`

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

  /** Drops all drafts, when a person leaves a shared computer. */
  function forgetAll() {
    const kept = storage()
    for (const key of Object.keys(kept ?? {})) if (key.startsWith(PREFIX)) kept?.removeItem(key)
  }

  return { save, read, forget, forgetAll }
})
