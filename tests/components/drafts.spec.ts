import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, expect, it } from 'vitest'
import { useDraftsStore } from '~/stores/drafts'

beforeEach(() => {
  setActivePinia(createPinia())
  sessionStorage.clear()
})

it('a person who leaves takes every draft along, and nothing else of the tab', () => {
  const drafts = useDraftsStore()
  drafts.save('plan', { title: 'Alloy RM-18' })
  drafts.save('run-0218-entry', { level: '88' })
  sessionStorage.setItem('another', 'kept')
  drafts.forgetAll()
  expect(drafts.read('plan')).toBeNull()
  expect(drafts.read('run-0218-entry')).toBeNull()
  expect(sessionStorage.getItem('another')).toBe('kept')
})
