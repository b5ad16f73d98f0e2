import { flushPromises, mount } from '@vue/test-utils'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { defineComponent } from 'vue'
import { z } from 'zod'
import { quantitySchema } from '#shared/schemas/common'
import { CONNECTION_LOST, SESSION_ENDED } from '#shared/utils/refusal-words'
import { useDraftForm } from '~/composables/useDraftForm'
import { useToastsStore } from '~/stores/toasts'
import { globals } from './support'

const schema = z.object({ level: quantitySchema('a level', '%', { least: 0, most: 100 }) })
const post = vi.fn<(url: string, options: unknown) => Promise<unknown>>()
const settle = async () => {
  await flushPromises()
  await new Promise(done => setTimeout(done, 30))
  await flushPromises()
}

function mountReading() {
  return mount(defineComponent({
    template: '<form @submit="submit"><FormQuantity name="level" label="Level" unit="%" /><BaseRefusal :text="refusal" /><button :disabled="busy">Record</button></form>',
    setup() {
      const { send, busy, refusal } = useDraftForm(schema, { draft: 'reading' })
      return { submit: send('/api/runs/1/entries', { done: 'Reading recorded.' }), busy, refusal }
    },
  }), { global: globals(), attachTo: document.body })
}
async function record(form: ReturnType<typeof mountReading>, typed: string) {
  await form.get('input').setValue(typed)
  await form.get('form').trigger('submit')
  await settle()
}

beforeEach(() => {
  vi.stubGlobal('$fetch', post)
  post.mockReset()
  sessionStorage.clear()
})
afterEach(() => {
  document.body.innerHTML = ''
  vi.unstubAllGlobals()
})

describe('a form with a draft', () => {
  it('sends the number once, however often the button is pressed', async () => {
    let answer: (reply: unknown) => void = () => {}
    post.mockReturnValue(new Promise(done => answer = done))
    const form = mountReading()
    await record(form, '61,5')
    await form.get('form').trigger('submit')
    await settle()
    answer({ id: 1 })
    await settle()
    expect(post).toHaveBeenCalledTimes(1)
    expect(post).toHaveBeenCalledWith('/api/runs/1/entries', expect.objectContaining({ method: 'POST', body: { level: 61.5 } }))
    expect(useToastsStore().shown.map(toast => toast.text)).toEqual(['Reading recorded.'])
  })

  it.each([['the connection is lost', {}, CONNECTION_LOST], ['the session ended', { statusCode: 401 }, SESSION_ENDED]])('keeps what was typed when %s, also over a reload', async (_, error, sentence) => {
    post.mockRejectedValue(error)
    const form = mountReading()
    await record(form, '61.5')
    expect(form.get('[role=alert]').text()).toContain(sentence)
    expect(form.get('input').element.value).toBe('61.5')
    form.unmount()
    const again = mountReading()
    await settle()
    expect(again.get('input').element.value).toBe('61.5')
  })

  it('keeps half-typed text of a page that is left', async () => {
    const form = mountReading()
    await form.get('input').setValue('about 6')
    await flushPromises()
    form.unmount()
    const again = mountReading()
    await settle()
    expect(again.get('input').element.value).toBe('about 6')
  })

  it('forgets the draft once it was taken', async () => {
    post.mockResolvedValue({ id: 1 })
    const form = mountReading()
    await record(form, '61.5')
    form.unmount()
    const again = mountReading()
    await settle()
    expect(again.get('input').element.value).toBe('')
  })

  it('puts what the server refuses at its field', async () => {
    post.mockRejectedValue({ statusCode: 400, data: { message: 'This does not fit.', data: { issues: [{ path: ['level'], message: 'The level lies above the last one. Check it.' }] } } })
    const form = mountReading()
    await record(form, '99')
    expect(form.get('[role=alert]').text()).toBe('This does not fit.')
    const input = form.get('input')
    expect(document.getElementById(input.attributes('aria-describedby')!)?.textContent?.trim()).toBe('The level lies above the last one. Check it.')
    expect(input.element.value).toBe('99')
  })
})
