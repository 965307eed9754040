export type Json =
  string | number | boolean | null | readonly Json[] | { readonly [key: string]: Json | undefined }

/** JSON text with keys sorted and entries that are undefined left out: the same value gives the same bytes. */
export function stableJson(value: Json, indent = 2): string {
  return `${JSON.stringify(sorted(value), null, indent)}\n`
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
