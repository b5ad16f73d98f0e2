import { afterEach, describe, expect, it } from 'vitest'
import { RUN_STATE_WORDS, RUN_STATES } from '#shared/runs/states'
import { CONNECTION_LOST, SESSION_ENDED } from '#shared/utils/refusal-words'
import { mountByName } from './support'

afterEach(() => {
  document.body.innerHTML = ''
})

describe('a state mark', () => {
  it.each(RUN_STATES)('says %s in words, with a shape', (state) => {
    const mark = mountByName('BaseStateMark', { props: { state } })
    expect(mark.text()).toBe(RUN_STATE_WORDS[state])
    expect(mark.find('svg path').exists()).toBe(true)
  })
})

describe('a button', () => {
  it('is a link when it leads somewhere', () => {
    expect(mountByName('BaseButton', { props: { to: '/plan' }, slots: { default: 'Plan a run' } }).get('a').attributes('href')).toBe('/plan')
  })
  it('cannot be pressed again while it is busy', () => {
    const button = mountByName('BaseButton', { props: { busy: true }, slots: { default: 'Send' } }).get('button')
    expect(button.attributes()).toMatchObject({ 'disabled': '', 'aria-busy': 'true' })
  })
})

describe('a refusal', () => {
  it('offers the sign-in page only where the session ended', () => {
    expect(mountByName('BaseRefusal', { props: { text: SESSION_ENDED } }).get('a').attributes('href')).toBe('/sign-in')
    expect(mountByName('BaseRefusal', { props: { text: CONNECTION_LOST } }).find('a').exists()).toBe(false)
    expect(mountByName('BaseRefusal', { props: { text: '' } }).find('[role=alert]').exists()).toBe(false)
  })
})

describe('a range bar', () => {
  const geometry = (band: [number | null, number | null], value: number) => {
    const bar = mountByName('BaseRangeBar', { props: { band, value, status: 'ok', label: 'number' } })
    const rect = bar.get('rect')
    return { from: Number(rect.attributes('x')), to: Number(rect.attributes('x')) + Number(rect.attributes('width')), at: Number(/^M([\d.]+)/.exec(bar.get('path').attributes('d')!)![1]) + 4.5 }
  }
  it('puts a number inside its band inside, and one outside outside', () => {
    const inside = geometry([1, 3], 2)
    expect(inside.at).toBeGreaterThan(inside.from)
    expect(inside.at).toBeLessThan(inside.to)
    const above = geometry([1, 3], 9)
    expect(above.at).toBeGreaterThan(above.to)
  })
  it('runs an open end to the edge', () => {
    expect(geometry([null, 3], 2).from).toBe(0)
    expect(geometry([1, null], 2).to).toBe(150)
  })
})

describe('a table', () => {
  interface Row { id: string, name: string, litres: number | null }
  const rows: Row[] = [{ id: 'a', name: 'Run 10', litres: 9.5 }, { id: 'b', name: 'Run 2', litres: null }, { id: 'c', name: 'Run 1', litres: 72 }]
  const columns = [{ key: 'name', label: 'Run', value: (row: Row) => row.name }, { key: 'litres', label: 'Helium, L', value: (row: Row) => row.litres, numeric: true }]
  const mountTable = (more: Record<string, unknown> = {}) => mountByName('BaseTable', { props: { caption: 'Runs', columns, rows, rowKey: (row: Row) => row.id, ...more } })
  const namesOf = (table: ReturnType<typeof mountTable>) => table.findAll('tbody tr').map(row => row.findAll('td')[0]!.text().replace(/^Run(?=Run)/, ''))

  it('has a caption, heads with a scope, and a region that scrolls by keyboard', () => {
    const table = mountTable()
    expect(table.get('caption').text()).toBe('Runs')
    expect(table.findAll('th').every(head => head.attributes('scope') === 'col')).toBe(true)
    expect(table.get('[role=region]').attributes()).toMatchObject({ 'tabindex': '0', 'aria-label': 'Runs' })
  })
  it('sorts numbers as numbers and says so, empty cells last both ways', async () => {
    const table = mountTable()
    const head = table.findAll('th')[1]!
    await head.get('button').trigger('click')
    expect(head.attributes('aria-sort')).toBe('ascending')
    expect(namesOf(table)).toEqual(['Run 10', 'Run 1', 'Run 2'])
    await head.get('button').trigger('click')
    expect(head.attributes('aria-sort')).toBe('descending')
    expect(namesOf(table)).toEqual(['Run 1', 'Run 10', 'Run 2'])
  })
  it('sorts numbers within words by their size', async () => {
    const table = mountTable()
    await table.findAll('th')[0]!.get('button').trigger('click')
    expect(namesOf(table)).toEqual(['Run 1', 'Run 2', 'Run 10'])
  })
  it('filters, and says how many are left', async () => {
    const table = mountTable()
    await table.get('input[type=search]').setValue('72')
    expect(namesOf(table)).toEqual(['Run 1'])
    expect(table.get('[role=status]').text()).toBe('1 row')
    await table.get('input[type=search]').setValue('nothing')
    expect(table.text()).toContain('Nothing fits this filter')
  })
  it('pages, and asks the server for what it still holds', async () => {
    const table = mountTable({ pageSize: 2, hasMore: true })
    expect(namesOf(table)).toEqual(['Run 10', 'Run 2'])
    const press = (text: string) => table.findAll('nav button').find(button => button.text() === text)!.trigger('click')
    await press('Next')
    expect(namesOf(table)).toEqual(['Run 1'])
    await press('Load more rows')
    expect(table.emitted('more')).toHaveLength(1)
  })
})
