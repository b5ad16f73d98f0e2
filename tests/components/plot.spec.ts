import { mount } from '@vue/test-utils'
import { afterEach, beforeAll, describe, expect, it } from 'vitest'
import { defineComponent, ref } from 'vue'
import { globals } from './support'

beforeAll(() => {
  // No layout here: the frame keeps the width that it has on the server.
  globalThis.ResizeObserver = class {
    observe() {}
    unobserve() {}
    disconnect() {}
  }
})
afterEach(() => {
  document.body.innerHTML = ''
})

function mountPlot(parts: string, data: Record<string, unknown> = {}, y = '{ label: \'C/T\', domain: [0, 10] }') {
  return mount(defineComponent({
    template: `<PlotFrame title="C/T against T²" :x="{ label: 'T² / K²', domain: [0, 100] }" :y="${y}">${parts}</PlotFrame>`,
    setup: () => data,
  }), { global: globals(), attachTo: document.body })
}

describe('the frame', () => {
  it('has a name, axis titles and numbers', () => {
    const plot = mountPlot('')
    expect(plot.get('svg').attributes('aria-label')).toBe('C/T against T²')
    expect(plot.text()).toContain('T² / K²')
    expect(plot.findAll('text.num').map(text => text.text())).toContain('100')
  })
  it('has its decades on a logarithmic axis', () => {
    const plot = mountPlot('', {}, '{ label: \'T / K\', domain: [0.01, 300], scale: \'log\' }')
    const ticks = plot.findAll('text.num').map(text => text.text())
    for (const decade of ['0.01', '0.1', '1', '10', '100']) expect(ticks).toContain(decade)
  })
})

describe('points', () => {
  it('are filled inside and open outside the window, each with its error bar', () => {
    const plot = mountPlot('<PlotPoints :series="series" :is-inside="at => at < 2" />', { series: { x: [10, 20, 30], y: [1, 2, 3], error: [0.1, 0.1, 0.1] } })
    const count = (selector: string) => plot.get(selector).attributes('d')!.split('M').length - 1
    expect(count('[data-points=inside]')).toBe(2)
    expect(count('[data-points=outside]')).toBe(1)
    expect(plot.findAll('path')[0]!.attributes('d')!.split('M')).toHaveLength(4)
  })
  it('leave out what has no place on the axis', () => {
    const plot = mountPlot('<PlotPoints :series="series" />', { series: { x: [10, 20], y: [NaN, 2] } })
    expect(plot.get('[data-points=inside]').attributes('d')!.split('M')).toHaveLength(2)
  })
})

describe('a line', () => {
  it('is broken where a value is missing', () => {
    const plot = mountPlot('<PlotLine :series="series" />', { series: { x: [0, 10, 20, 30, 40], y: [1, 2, NaN, 3, 4] } })
    const path = plot.findAll('path').at(-1)!.attributes('d')!
    expect(path.match(/[ML]/g)!.join('')).toBe('MLML')
  })
})

describe('the window', () => {
  const edges = (plot: ReturnType<typeof mountPlot>) => plot.findAll('[role=slider]')
  it('moves by the arrow keys, never past its other edge or out of its bounds', async () => {
    const chosen = ref([20, 50])
    const plot = mountPlot('<template #over><PlotWindow v-model="chosen" label="Fitted window" unit="K²" :bounds="[0, 100]" :step="5" /></template>', { chosen })
    await edges(plot)[0]!.trigger('keydown', { key: 'ArrowRight' })
    expect(chosen.value).toEqual([25, 50])
    await edges(plot)[0]!.trigger('keydown', { key: 'End' })
    expect(chosen.value).toEqual([50, 50])
    await edges(plot)[1]!.trigger('keydown', { key: 'PageUp' })
    expect(chosen.value).toEqual([50, 100])
    expect(edges(plot)[1]!.attributes()).toMatchObject({ 'aria-label': 'Fitted window, upper end', 'aria-valuenow': '100', 'aria-valuetext': '100 K²' })
  })
  it('goes to the next data point where it is told how', async () => {
    const chosen = ref([20, 50])
    const step = (from: number, presses: number) => from + presses * 7
    const plot = mountPlot('<template #over><PlotWindow v-model="chosen" label="Window" :bounds="[0, 100]" :step="step" /></template>', { chosen, step })
    await edges(plot)[1]!.trigger('keydown', { key: 'ArrowLeft' })
    expect(chosen.value).toEqual([20, 43])
  })
  it('can be typed, and says why it does not take an empty stretch', async () => {
    const chosen = ref<readonly number[]>([20, 50])
    const fields = mount(defineComponent({ template: '<PlotWindowFields v-model="chosen" label="Window" unit="K" :bounds="[1, 100]" />', setup: () => ({ chosen }) }), { global: globals() })
    const [low, high] = fields.findAll('input')
    await low!.setValue('12,5')
    expect(chosen.value).toEqual([12.5, 50])
    await high!.setValue('3')
    expect(chosen.value).toEqual([12.5, 50])
    expect(fields.get('[role=alert]').text()).toContain('lower end lies above')
    expect(high!.element.value).toBe('3')
  })
})

describe('the cursor', () => {
  it('says one point after the other', async () => {
    const plot = mountPlot('<template #over><PlotCursor :points="points" /></template>', { points: [{ x: 10, y: 1, text: '10 K², 1.0' }, { x: 20, y: 2, text: '20 K², 2.0' }] })
    const cursor = plot.get('[role=slider]')
    await cursor.trigger('keydown', { key: 'ArrowRight' })
    expect(cursor.attributes('aria-valuetext')).toBe('Point 1 of 2: 10 K², 1.0')
    await cursor.trigger('keydown', { key: 'End' })
    expect(cursor.attributes('aria-valuetext')).toBe('Point 2 of 2: 20 K², 2.0')
  })
})

describe('the figure', () => {
  it('turns into a table of the same numbers', async () => {
    const figure = mount(defineComponent({
      template: '<PlotFigure summary="Two points." file-name="points" :heads="[\'T / K\', \'C\']" :rows="[[1.5, -2], [3, null]]"><svg data-plot /></PlotFigure>',
    }), { global: globals(), attachTo: document.body })
    const press = () => figure.findAll('button').find(button => /Show (table|plot)/.test(button.text()))!.trigger('click')
    await press()
    expect(figure.get('table caption').text()).toBe('Two points.')
    expect(figure.findAll('tbody td').map(cell => cell.text())).toEqual(['1.5', '−2', '3', ''])
    await press()
    expect(figure.find('table').exists()).toBe(false)
  })
})
