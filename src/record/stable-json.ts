export type Json =
  string | number | boolean | null | readonly Json[] | { readonly [key: string]: Json | undefined }

/** What JSON may leave as it is, but a terminal may obey: control characters beyond ASCII's first, and marks that turn text. */
const UNSAFE = /[\u007f-\u009f\u061c\u200e\u200f\u2028-\u202e\u2066-\u2069]/g

/**
 * JSON text with keys sorted and entries that are undefined left out: the same value gives the same bytes. Characters that
 * could act on a terminal are escaped.
 */
export function stableJson(value: Json, indent = 2): string {
  const text = JSON.stringify(sorted(value), null, indent)
  return `${text.replace(UNSAFE, (c) => `\\u${c.charCodeAt(0).toString(16).padStart(4, '0')}`)}\n`
}

function sorted(value: Json): Json {
  if (Array.isArray(value)) return (value as readonly Json[]).map(sorted)
  if (value === null || typeof value !== 'object') return value
  const entries = Object.entries(value as { readonly [key: string]: Json | undefined }).filter(
    ([, inner]) => inner !== undefined,
  )
  entries.sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0))
  return Object.fromEntries(entries.map(([key, inner]) => [key, sorted(inner as Json)]))
}
