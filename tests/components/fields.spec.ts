import { afterEach, describe, expect, it } from 'vitest'
import { z } from 'zod'
import { mountByName, mountForm } from './support'

const settle = () => new Promise(done => setTimeout(done, 40))
afterEach(() => {
  document.body.innerHTML = ''
})

describe('a file', () => {
  const table = (bytes: number) => new File([new Uint8Array(bytes)], 'copper.csv', { type: 'text/csv' })
  const drop = (mounted: ReturnType<typeof mountByName>, file: File) => mounted.get('label').trigger('drop', { dataTransfer: { files: [file] } })

  it('is taken by a drop and shown with name and size', async () => {
    const mounted = mountByName('FormFile', { props: { label: 'Measured table', limitBytes: 5000 } })
    await drop(mounted, table(2400))
    const [given] = mounted.emitted('update:modelValue')![0] as [File]
    expect(given.name).toBe('copper.csv')
    await mounted.setProps({ modelValue: given } as never)
    expect(mounted.text()).toContain('copper.csv')
    expect(mounted.text()).toContain('2\u2009kB')
  })
  it('too large is named with the limit, and the one held before stays', async () => {
    const mounted = mountByName('FormFile', { props: { label: 'Measured table', limitBytes: 5000 } })
    await drop(mounted, table(9000))
    expect(mounted.emitted('update:modelValue')).toBeUndefined()
    expect(mounted.get('[role=alert]').text()).toBe('copper.csv has 9\u2009kB; at most 5\u2009kB can be taken.')
    const input = mounted.get('input')
    expect(input.attributes('aria-invalid')).toBe('true')
    expect(document.getElementById(input.attributes('aria-describedby')!)?.textContent).toContain('at most')
  })
})

describe('choices', () => {
  const OPTIONS = '[{ value: \'low\', label: \'1.5 to 20 K\' }, { value: \'wide\', label: \'1.5 to 300 K\' }]'
  const schema = z.object({
    range: z.string({ required_error: 'Choose a range.' }),
    cryostat: z.string({ required_error: 'Choose a cryostat.' }),
    read: z.boolean().optional().refine(Boolean, 'Tick this once you have read it.'),
  })
  const mounted = () => mountForm(`
    <FormRadioGroup name="range" label="Range" :options="${OPTIONS}" />
    <FormSelect name="cryostat" label="Cryostat" placeholder="Choose" :options="[{ value: 'petrel', label: 'Petrel' }]" />
    <FormCheckbox name="read" label="I have read the cautions" />`, schema)

  it('say what is missing beside themselves', async () => {
    const { wrapper, sent } = mounted()
    await wrapper.get('form').trigger('submit')
    await settle()
    expect(sent).toEqual([])
    for (const name of ['select', 'input[type=checkbox]']) expect(wrapper.get(name).attributes('aria-invalid')).toBe('true')
    const fieldset = wrapper.get('fieldset')
    expect(document.getElementById(fieldset.attributes('aria-describedby')!)?.textContent?.trim()).toBe('Choose a range.')
    expect(wrapper.text()).toContain('Choose a cryostat.')
    expect(wrapper.text()).toContain('Tick this once you have read it.')
  })
  it('hand over what was chosen', async () => {
    const { wrapper, sent } = mounted()
    await wrapper.get('input[value=wide]').setValue()
    await wrapper.get('select').setValue('petrel')
    await wrapper.get('input[type=checkbox]').setValue(true)
    await wrapper.get('form').trigger('submit')
    await settle()
    expect(sent).toEqual([{ range: 'wide', cryostat: 'petrel', read: true }])
  })
  it('are named by their legend and labels', () => {
    const { wrapper } = mounted()
    expect(wrapper.get('legend').text()).toBe('Range')
    expect(wrapper.get(`label[for="${wrapper.get('select').attributes('id')}"]`).text()).toBe('Cryostat')
  })
})
