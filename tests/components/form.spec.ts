import { flushPromises } from '@vue/test-utils'
import { afterEach, describe, expect, it } from 'vitest'
import { z } from 'zod'
import { instantSchema, lineSchema, quantitySchema } from '#shared/schemas/common'
import { mountForm } from './support'

const settle = async () => {
  await flushPromises()
  await new Promise(done => setTimeout(done, 20))
  await flushPromises()
}
afterEach(() => {
  document.body.innerHTML = ''
})

describe('a quantity', () => {
  const schema = z.object({ level: quantitySchema('a level', '%', { least: 0, most: 100 }) })
  const field = '<FormQuantity name="level" label="Level" unit="%" hint="As read off the meter" />'

  it('takes a decimal comma and keeps the text as typed', async () => {
    const { wrapper, sent } = mountForm(field, schema)
    await wrapper.get('input').setValue('61,5')
    await wrapper.get('form').trigger('submit')
    await settle()
    expect(sent).toEqual([{ level: 61.5 }])
    expect(wrapper.get('input').element.value).toBe('61,5')
  })

  it('refuses text that is no number, and keeps it', async () => {
    const { wrapper, sent } = mountForm(field, schema)
    await wrapper.get('input').setValue('about half')
    await wrapper.get('form').trigger('submit')
    await settle()
    expect(sent).toEqual([])
    expect(wrapper.get('input').element.value).toBe('about half')
    expect(wrapper.text()).toContain('“about half” is not a number')
  })

  it('ties label with unit, hint and error to the input', async () => {
    const { wrapper } = mountForm(field, schema)
    await wrapper.get('input').setValue('140')
    await settle()
    const input = wrapper.get('input')
    expect(wrapper.get(`label[for="${input.attributes('id')}"]`).text()).toBe('Level, %')
    expect(input.attributes('aria-invalid')).toBe('true')
    const described = input.attributes('aria-describedby')!.split(' ').map(id => document.getElementById(id)?.textContent?.trim())
    expect(described).toEqual(['As read off the meter', 'Enter a level from 0 to 100 %.'])
  })

  it('follows a draft that is put back, also one that was no number', async () => {
    const { wrapper, form } = mountForm(field, schema)
    form.setValues({ level: 42.5 }, false)
    await settle()
    expect(wrapper.get('input').element.value).toBe('42.5')
    form.setValues({ level: 'half' }, false)
    await settle()
    expect(wrapper.get('input').element.value).toBe('half')
  })
})

describe('a day and a time', () => {
  const schema = z.object({ at: instantSchema })
  const field = '<FormDateTime name="at" label="Read at" time-zone="Europe/Oslo" />'
  async function type(date: string, time: string) {
    const mounted = mountForm(field, schema)
    const [day, hour] = mounted.wrapper.findAll('input')
    await day!.setValue(date)
    await day!.trigger('blur')
    await hour!.setValue(time)
    await hour!.trigger('blur')
    await mounted.wrapper.get('form').trigger('submit')
    await settle()
    return mounted
  }

  it('reads the facility’s clock, not the reader’s', async () => {
    const { sent } = await type('2027-07-04', '9:30')
    expect(sent).toEqual([{ at: new Date('2027-07-04T07:30:00Z') }])
  })
  it('takes a day as it is written in Europe', async () => {
    const { sent } = await type('4.12.2027', '0930')
    expect(sent).toEqual([{ at: new Date('2027-12-04T08:30:00Z') }])
  })
  it('names the next time that exists where the clock is put forward, and keeps what was typed', async () => {
    const { wrapper, sent } = await type('2027-03-28', '02:30')
    expect(sent).toEqual([])
    expect(wrapper.text()).toContain('The next one that does is 03:00.')
    expect(wrapper.findAll('input').map(input => input.element.value)).toEqual(['2027-03-28', '02:30'])
  })
  it('refuses a day that no month has', async () => {
    const { wrapper, sent } = await type('2027-02-31', '10:00')
    expect(sent).toEqual([])
    expect(wrapper.text()).toContain('“2027-02-31” is not a day')
  })
  it('says its format and zone', () => {
    const { wrapper } = mountForm(field, schema)
    expect(wrapper.text()).toContain('Year-month-day and hours:minutes, facility time, Europe/Oslo')
  })
})

describe('the error summary', () => {
  it('lists what is missing, takes the focus, and leads to the field', async () => {
    const { wrapper } = mountForm('<FormErrorSummary :labels="{ title: \'Title\' }" /><FormText name="title" label="Title" />', z.object({ title: lineSchema('a title') }))
    expect(wrapper.find('[role=alert]').exists()).toBe(false)
    await wrapper.get('form').trigger('submit')
    await settle()
    const summary = wrapper.get('[role=alert]')
    expect(summary.text()).toContain('Title: Enter a title.')
    expect(document.activeElement).toBe(summary.element)
    await summary.get('a').trigger('click')
    expect(document.activeElement).toBe(wrapper.get('input[name=title]').element)
  })
})
