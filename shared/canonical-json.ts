import serialize from 'canonicalize'

/**
 * Canonical JSON of a plain value: RFC 8785 (JCS) with every text in Unicode normalization form C, so that
 * equal documents have equal bytes on every machine. Encode the result as UTF-8 before hashing.
 *
 * @throws RangeError for what JSON cannot hold (undefined, NaN, infinity, functions)
 */
export function canonicalJson(value: unknown): string {
  const result = serialize(normalized(value))
  if (result === undefined) throw new RangeError('canonicalJson needs a JSON value')
  return result
}

function normalized(value: unknown): unknown {
  switch (typeof value) {
    case 'string':
      return value.normalize('NFC')
    case 'number':
      if (!Number.isFinite(value)) throw new RangeError(`canonicalJson cannot hold ${value}`)
      return value
    case 'boolean':
      return value
    case 'object':
      return normalizedObject(value)
    default:
      throw new RangeError(`canonicalJson cannot hold a ${typeof value}`)
  }
}

function normalizedObject(value: object | null): unknown {
  if (value === null) return null
  if (Array.isArray(value)) return value.map(normalized)
  const entries = Object.entries(value).filter(([, member]) => member !== undefined)
  return Object.fromEntries(entries.map(([key, member]) => [key.normalize('NFC'), normalized(member)]))
}
