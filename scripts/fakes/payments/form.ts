/** A form value as the provider's API nests it: `line_items[0][price_data][currency]=eur`. */
export type FormValue = string | FormValue[] | { [key: string]: FormValue }

/** Decodes a form-encoded body with bracketed nesting. */
export function decodeForm(body: string): Record<string, FormValue> {
  const root: Record<string, FormValue> = {}
  for (const [path, value] of new URLSearchParams(body)) {
    const keys = path.replaceAll(']', '').split('[')
    if (keys.some(key => ['__proto__', 'constructor', 'prototype'].includes(key))) continue
    put(root, keys, value)
  }
  return fold(root) as Record<string, FormValue>
}

function put(target: Record<string, FormValue>, [key = '', ...rest]: string[], value: string) {
  const name = key === '' ? String(Object.keys(target).length) : key
  if (rest.length === 0) {
    target[name] = value
    return
  }
  const next = typeof target[name] === 'object' && !Array.isArray(target[name]) ? target[name] : {}
  target[name] = next
  put(next, rest, value)
}

/** Turns objects whose keys count from nought into lists. */
function fold(value: FormValue): FormValue {
  if (typeof value === 'string' || Array.isArray(value)) return value
  const entries = Object.entries(value).map(([key, inner]) => [key, fold(inner)] as const)
  return entries.length > 0 && entries.every(([key], index) => key === String(index)) ? entries.map(([, inner]) => inner) : Object.fromEntries(entries)
}

/** The text at a path, or undefined. */
export function textAt(form: FormValue | undefined, ...path: (string | number)[]): string | undefined {
  let value = form
  for (const key of path) {
    if (value === undefined || typeof value === 'string') return undefined
    value = Array.isArray(value) ? value[Number(key)] : value[String(key)]
  }
  return typeof value === 'string' ? value : undefined
}

/** The texts of a nested object, such as metadata. */
export function textsAt(form: FormValue | undefined, key: string): Record<string, string> {
  const value = typeof form === 'object' && !Array.isArray(form) ? form[key] : undefined
  if (typeof value !== 'object' || Array.isArray(value)) return {}
  return Object.fromEntries(Object.entries(value).filter((entry): entry is [string, string] => typeof entry[1] === 'string'))
}
