/** A value that JSON can say. Numbers are finite. */
export type Json = null | boolean | number | string | readonly Json[] | { readonly [key: string]: Json }

const LONE_SURROGATE = /[\uD800-\uDBFF](?![\uDC00-\uDFFF])|(?<![\uD800-\uDBFF])[\uDC00-\uDFFF]/

function quoted(text: string): string {
  if (LONE_SURROGATE.test(text)) throw new TypeError('a lone surrogate has no canonical form')
  return JSON.stringify(text)
}

/**
 * Canonical text of a JSON value: RFC 8785 (JSON Canonicalization Scheme). Members in the order of their names' UTF-16 code
 * units, no white space, numbers and strings as ECMAScript writes them.
 * Throws TypeError for what I-JSON cannot carry: NaN, infinities, lone surrogates, undefined.
 */
export function canonicalText(value: Json): string {
  if (value === null || typeof value === 'boolean') return String(value)
  if (typeof value === 'string') return quoted(value)
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new TypeError('a number without a value has no canonical form')
    return JSON.stringify(value)
  }
  if (Array.isArray(value)) return `[${value.map(canonicalText).join(',')}]`
  if (typeof value !== 'object') throw new TypeError(`a ${typeof value} has no canonical form`)
  const members = value as { readonly [key: string]: Json }
  // the default order of sort() is by UTF-16 code units, which is what the RFC asks for
  return `{${Object.keys(members).sort().map(name => `${quoted(name)}:${canonicalText(members[name]!)}`).join(',')}}`
}

/** The canonical text as UTF-8: what is hashed. */
export function canonicalBytes(value: Json): Uint8Array {
  return new TextEncoder().encode(canonicalText(value))
}
