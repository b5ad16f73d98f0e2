import { invalid } from './errors'
import { type Form, textAt } from './form'
import type { PaymentsStore } from './store'

/** One page of objects, newest first, as the provider pages: `limit`, `starting_after`, `ending_before`. */
export function pageOf<T extends { id: string }>(objects: Iterable<T>, url: string, query: Form, wanted: (object: T) => boolean = () => true) {
  const limit = Number(textAt(query, 'limit') ?? 10)
  if (!Number.isInteger(limit) || limit < 1 || limit > 100) throw invalid('Invalid limit: it must be between 1 and 100.', 'limit')
  const all = [...objects].toReversed().filter(wanted)
  const indexOf = (cursor: 'starting_after' | 'ending_before') => {
    const id = textAt(query, cursor)
    if (id === undefined) return null
    const index = all.findIndex(object => object.id === id)
    if (index < 0) throw invalid(`No such object: '${id}'`, cursor, 'resource_missing')
    return index
  }
  const [after, before] = [indexOf('starting_after'), indexOf('ending_before')]
  const from = before === null ? (after ?? -1) + 1 : Math.max(0, before - limit)
  const data = all.slice(from, before ?? from + limit)
  return { object: 'list', url, has_more: before === null ? from + limit < all.length : from > 0, data }
}

/** A copy of a reply in which the paths of `expand[]` show whole objects instead of ids. */
export function expanded(store: PaymentsStore, reply: unknown, query: Form): unknown {
  const paths = Array.isArray(query.expand) ? query.expand.filter(path => typeof path === 'string') : []
  const copy: unknown = structuredClone(reply)
  return paths.reduce((value, path) => expandPath(store, value, path.split('.')), copy)
}

function expandPath(store: PaymentsStore, value: unknown, [key, ...rest]: string[]): unknown {
  if (Array.isArray(value)) return value.map(item => expandPath(store, item, [key ?? '', ...rest]))
  if (key === undefined || typeof value !== 'object' || value === null) return value
  const record = value as Record<string, unknown>
  const inner = key === 'line_items' && typeof record.id === 'string'
    ? { object: 'list', url: `/v1/checkout/sessions/${record.id}/line_items`, has_more: false, data: store.sessionFacts.get(record.id)?.items ?? [] }
    : record[key]
  const shown = typeof inner === 'string' ? structuredClone(store.lookUp(inner)) ?? inner : inner
  return { ...record, [key]: rest.length > 0 ? expandPath(store, shown, rest) : shown }
}
