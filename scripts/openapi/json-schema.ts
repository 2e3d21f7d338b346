/** As much of JSON Schema 2020-12 as the document is written in. */
export interface JsonSchema {
  $ref?: string
  type?: string | string[]
  description?: string
  properties?: Record<string, JsonSchema>
  required?: string[]
  additionalProperties?: JsonSchema | boolean
  items?: JsonSchema | boolean
  prefixItems?: JsonSchema[]
  anyOf?: JsonSchema[]
  oneOf?: JsonSchema[]
  enum?: unknown[]
  const?: unknown
  [keyword: string]: unknown
}

/** A schema with what its comment says, unless it says something itself. */
export function described(schema: JsonSchema, text: string): JsonSchema {
  return text && !schema.description ? { ...schema, description: text } : schema
}

const isPlain = (schema: JsonSchema): schema is { type: string } =>
  typeof schema.type === 'string' && Object.keys(schema).length === 1

/** One of several, written as short as it can be; null comes last. */
export function anyOf(members: JsonSchema[]): JsonSchema {
  const others = members.filter(({ type }) => type !== 'null')
  if (others.length === 0) return members[0] ?? {}
  const sorted = [...others, ...members.filter(({ type }) => type === 'null')]
  if (sorted.length === 1) return sorted[0]!
  return sorted.every(isPlain) ? { type: sorted.map(({ type }) => type) } : { anyOf: sorted }
}
