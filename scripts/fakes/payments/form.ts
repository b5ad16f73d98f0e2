import { ApiError, invalid } from './errors'

/** A form value as the provider's API nests it: `line_items[0][price_data][currency]=eur`. */
export type FormValue = string | FormValue[] | { [key: string]: FormValue }

/** A decoded form. */
export type Form = Record<string, FormValue>

/** Decodes a form-encoded body (or query) with bracketed nesting. */
export function decodeForm(body: string): Form {
  const root: Form = {}
  for (const [path, value] of new URLSearchParams(body)) {
    const keys = path.replaceAll(']', '').split('[')
    if (keys.some(key => ['__proto__', 'constructor', 'prototype'].includes(key))) continue
    put(root, keys, value)
  }
  return fold(root) as Form
}

function put(target: Form, [key = '', ...rest]: string[], value: string) {
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

/** A text that must be there. */
export function requiredText(form: Form, key: string): string {
  const text = textAt(form, key)
  if (!text) throw invalid(`Missing required param: ${key}.`, key, 'parameter_missing')
  return text
}

/** An amount in minor units: the provider's smallest charge is 50 of them. */
export function amountOf(text: string | undefined, param: string): number {
  if (!text || !/^\d{1,8}$/.test(text)) throw invalid(`Invalid integer: ${text ?? ''}`, param, 'parameter_invalid_integer')
  const amount = Number(text)
  if (amount < 50) throw new ApiError(400, { type: 'invalid_request_error', code: 'amount_too_small', message: 'The amount must be at least 50 minor units.', param })
  return amount
}

/** Refuses parameters the endpoint does not know, as the provider does. */
export function onlyKnown(form: Form, known: readonly string[]) {
  const stranger = Object.keys(form).find(key => key !== 'expand' && !known.includes(key))
  if (stranger) throw invalid(`Received unknown parameter: ${stranger}`, stranger, 'parameter_unknown')
}
