import { type Ref, computed, ref, watch } from 'vue'

/** What sorting and filtering need of a column. */
interface SortableColumn<Row> { key: string, value: (row: Row) => string | number | null, text?: (row: Row) => string }

/**
 * Rows of a table filtered by words, sorted by a column (empty cells last) and cut into pages.
 *
 * @param rows all rows at hand
 * @param columns their columns
 * @param pageSize rows a page
 */
export function useTableRows<Row>(rows: Readonly<Ref<readonly Row[]>>, columns: Readonly<Ref<readonly SortableColumn<Row>[]>>, pageSize: () => number) {
  const filter = ref('')
  const sort = ref<{ key: string, isDown: boolean } | null>(null)
  const page = ref(0)
  const textOf = (column: SortableColumn<Row>, row: Row) => column.text?.(row) ?? String(column.value(row) ?? '')

  const filtered = computed(() => {
    const words = filter.value.toLowerCase().split(/\s+/).filter(Boolean)
    if (words.length === 0) return rows.value
    return rows.value.filter((row) => {
      const text = columns.value.map(column => `${textOf(column, row)} ${column.value(row) ?? ''}`).join(' ').toLowerCase()
      return words.every(word => text.includes(word))
    })
  })
  const sorted = computed(() => {
    const column = columns.value.find(candidate => candidate.key === sort.value?.key)
    if (!column) return filtered.value
    const direction = sort.value?.isDown ? -1 : 1
    return [...filtered.value].sort((a, b) => {
      const [left, right] = [column.value(a), column.value(b)]
      if (left === null || right === null) return left === right ? 0 : left === null ? 1 : -1
      return direction * (typeof left === 'number' && typeof right === 'number' ? left - right : String(left).localeCompare(String(right), 'en', { numeric: true }))
    })
  })
  const pages = computed(() => Math.max(1, Math.ceil(sorted.value.length / pageSize())))
  const shown = computed(() => sorted.value.slice(page.value * pageSize(), (page.value + 1) * pageSize()))

  watch(filter, () => {
    page.value = 0
  })
  // Rows that were added leave the page as it is; rows that went must not leave it empty.
  watch(pages, (count) => {
    page.value = Math.min(page.value, count - 1)
  })

  function toggle(key: string) {
    sort.value = sort.value?.key === key ? { key, isDown: !sort.value.isDown } : { key, isDown: false }
  }
  const ariaSort = (key: string) => sort.value?.key === key ? (sort.value.isDown ? 'descending' as const : 'ascending' as const) : undefined

  return { filter, sort, page, pages, sorted, shown, toggle, textOf, ariaSort }
}
