import text from '../../../docs/openapi.json'

/** What is used of JSON Schema in the document. */
export interface Schema {
  $ref?: string
  type?: string
  const?: unknown
  enum?: readonly unknown[]
  anyOf?: readonly Schema[]
  oneOf?: readonly Schema[]
  items?: Schema
  prefixItems?: readonly Schema[]
  properties?: Record<string, Schema>
  additionalProperties?: boolean | Schema
  required?: readonly string[]
  default?: unknown
  description?: string
  pattern?: string
  format?: string
  contentMediaType?: string
  minimum?: number
  maximum?: number
  exclusiveMinimum?: number
  exclusiveMaximum?: number
  minLength?: number
  maxLength?: number
  minItems?: number
  maxItems?: number
}

interface Parameter {
  name: string
  in: string
  required: boolean
  description?: string
  schema: Schema
}

export type Content = Record<string, { schema: Schema }>

interface Answer {
  description: string
  content?: Content
}

export interface Operation {
  operationId: string
  tags: readonly string[]
  summary: string
  description: string
  security: readonly Record<string, unknown>[]
  parameters: readonly (Parameter | { $ref: string })[]
  requestBody?: { content: Content }
  responses: Record<string, Answer | { $ref: string }>
}

interface Document {
  info: { description: string }
  paths: Record<string, Record<string, Operation>>
}

export const document = text as unknown as Document

/** Follows `#/components/…`; what is no reference is handed back. */
export function resolved<T extends object>(value: T | { $ref: string }): T {
  if (!('$ref' in value) || typeof value.$ref !== 'string') return value as T
  let found: unknown = document
  for (const part of value.$ref.split('/').slice(1)) found = (found as Record<string, unknown>)[part]
  return found as T
}

/** What a value may be, where it may be one of several things. */
export const choicesOf = ({ anyOf, oneOf }: Schema): readonly Schema[] | undefined => anyOf ?? oneOf
