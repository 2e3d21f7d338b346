import { groupDigits } from '../../../shared/engine/digits'
import type { RouteContent, RouteField } from '../../../shared/schemas/route-reference'
import type { Content, Schema } from './document'
import { choicesOf, resolved } from './document'

/** Fields within fields within fields are said; what lies deeper is named by its type alone. */
const MAX_DEPTH = 3
export const ID_PATTERN = '^[\\w-]{1,64}$'

const TYPES: Record<string, string> = {
  string: 'text',
  number: 'number',
  integer: 'whole number',
  boolean: 'true or false',
  null: 'null',
}
const FORMATS: Record<string, string> = {
  base64url: 'bytes, base64url',
  date: 'day, ISO 8601',
  email: 'e-mail address',
  uuid: 'UUID',
  'date-time': 'time, ISO 8601 UTC',
}

const plural = (type: string): string => type.replace(/^(object|number|whole number|list)\b/, '$1s')

/** What a value is, in words. */
export function typeOf(schema: Schema): string {
  const given = resolved(schema)
  const { type, items, prefixItems, contentMediaType, format, pattern, ...rest } = given
  const choices = choicesOf(given)
  if (choices) return [...new Set(choices.map(typeOf))].join(' or ')
  if ('const' in rest) return JSON.stringify(rest.const)
  if (rest.enum) return 'one of'
  if (contentMediaType) return 'file'
  if (prefixItems) return `list of ${prefixItems.length}`
  if (items) return `list of ${plural(typeOf(items))}`
  if (pattern === ID_PATTERN) return 'id'
  if (format && FORMATS[format]) return FORMATS[format]
  return TYPES[type ?? ''] ?? type ?? (rest.properties ? 'object' : 'anything')
}

/** A bound at the edge of what JSON holds exactly bounds nothing. */
const isBound = (value: number | undefined): value is number =>
  value !== undefined && Math.abs(value) < Number.MAX_SAFE_INTEGER

const shown = (value: number): string => (Number.isInteger(value) ? groupDigits(value) : String(value))

function between(least: number | undefined, most: number | undefined, unit = ''): string {
  const [low, high] = [isBound(least) ? least : undefined, isBound(most) ? most : undefined]
  if (low !== undefined && high !== undefined)
    return low === high ? `${shown(low)}${unit}` : `${shown(low)} to ${shown(high)}${unit}`
  if (low !== undefined) return `at least ${shown(low)}${unit}`
  return high === undefined ? '' : `at most ${shown(high)}${unit}`
}

/** What narrows a value beyond its type: choices, range, length, form, default. */
export function limitsOf(schema: Schema): string {
  const given = resolved(schema)
  const single =
    choicesOf(given)
      ?.map((one) => resolved(one))
      .filter(({ type }) => type !== 'null') ?? []
  const {
    exclusiveMinimum: above,
    exclusiveMaximum: below,
    pattern,
    format,
    ...one
  } = single.length === 1 ? single[0]! : given
  return [
    (one.enum ?? []).map((value) => JSON.stringify(value)).join(', '),
    between(one.minimum, one.maximum),
    isBound(above) ? `above ${shown(above)}` : '',
    isBound(below) ? `below ${shown(below)}` : '',
    between(one.minLength, one.maxLength, ' characters'),
    between(one.minItems, one.maxItems, ' entries'),
    pattern && pattern !== ID_PATTERN && !(format && FORMATS[format]) ? `matches ${pattern}` : '',
    given.default === undefined ? '' : `default ${JSON.stringify(given.default)}`,
  ]
    .filter(Boolean)
    .join('; ')
}

/** The objects that a value may be, or hold as entries, as the fields to be listed under it. */
function objectsIn(schema: Schema): Schema[] {
  const given = resolved(schema)
  const { items, additionalProperties, properties, ...rest } = given
  const choices = choicesOf(given)
  if (choices) return choices.flatMap(objectsIn)
  if (items) return objectsIn(items)
  if (properties) return [{ ...rest, properties }]
  return typeof additionalProperties === 'object' ? objectsIn(additionalProperties) : []
}

/** Fields under a value, depth first; each of several shapes is given one after the other. */
export function fieldsOf(schema: Schema, depth = 0): RouteField[] {
  if (depth >= MAX_DEPTH) return []
  return objectsIn(schema).flatMap(({ properties = {}, required = [] }) =>
    Object.entries(properties).flatMap(([name, field]) => [
      {
        ...{ name, depth, type: typeOf(field), limits: limitsOf(field) },
        required: required.includes(name),
        description: field.description ?? resolved(field).description ?? '',
      },
      ...fieldsOf(field, depth + 1),
    ]),
  )
}

/** What a body is made of, by media type. */
export const contentsOf = (content: Content = {}): RouteContent[] =>
  Object.entries(content).map(([media, { schema }]) => ({
    media,
    type: media.includes('json') && media !== 'application/x-ndjson' ? typeOf(schema) : '',
    fields: fieldsOf(schema),
  }))
