import type { Operation, Schema } from './document'
import { choicesOf, resolved } from './document'
import { ID_PATTERN } from './fields'

const FORMATS: Record<string, string> = {
  base64url: 'AAAA',
  email: 'name@example.org',
  uuid: '00000000-0000-4000-8000-000000000000',
  date: '2030-01-31',
  'date-time': '2030-01-31T12:00:00Z',
}

/** `problemId` is to be replaced where it says `PROBLEM_ID`. */
const placeholder = (name: string): string => name.replace(/([a-z])([A-Z])/g, '$1_$2').toUpperCase()

function textFor(name: string, { pattern, format, minLength = 0 }: Schema): string {
  if (format && FORMATS[format]) return FORMATS[format]
  if (pattern === ID_PATTERN) return placeholder(name)
  return (name || 'text').padEnd(minLength, '-')
}

/** One, or the number nearest to it that is allowed. */
function numberFor({ minimum, maximum, exclusiveMinimum, exclusiveMaximum }: Schema): number {
  if (exclusiveMaximum !== undefined && exclusiveMaximum <= 1)
    return ((exclusiveMinimum ?? minimum ?? exclusiveMaximum - 1) + exclusiveMaximum) / 2
  return Math.min(maximum ?? 1, Math.max(1, minimum ?? 1, (exclusiveMinimum ?? 0) + 1))
}

/** The smallest value that a schema takes, with what must be there. */
function valueFor(name: string, schema: Schema): unknown {
  const given = resolved(schema)
  if (given.default !== undefined) return given.default
  if ('const' in given) return given.const
  if (given.enum) return given.enum[0]
  const choices = choicesOf(given)
  if (choices) return valueFor(name, choices[0]!)
  if (given.prefixItems) return given.prefixItems.map((item) => valueFor(name, item))
  switch (given.type) {
    case 'string':
      return textFor(name, given)
    case 'integer':
    case 'number':
      return numberFor(given)
    case 'boolean':
      return true
    case 'null':
      return null
    case 'array':
      return Array.from({ length: Math.max(1, given.minItems ?? 1) }, () =>
        valueFor(name.replace(/s$/, ''), given.items ?? {}),
      )
    default:
      return objectFor(given)
  }
}

/** The fields that must be there; where none must, the first one, so that something is asked for. */
export function objectFor({ properties = {}, required = [] }: Schema): Record<string, unknown> {
  const all = Object.entries(properties)
  const needed = all.filter(([name]) => required.includes(name))
  return Object.fromEntries(
    (needed.length > 0 ? needed : all.slice(0, 1)).map(([name, field]) => [name, valueFor(name, field)]),
  )
}

const quoted = (text: string): string => `'${text.replaceAll("'", "'\\''")}'`

function formParts(schema: Schema): string[] {
  const { properties = {}, required = [] } = schema
  return Object.entries(properties).flatMap(([name, field]) => {
    if (name === 'file') return ["--form 'file=@FILE'"]
    return required.includes(name) ? [`--form ${quoted(`${name}=${String(valueFor(name, field))}`)}`] : []
  })
}

function bodyParts({ requestBody }: Operation): string[] {
  const form = requestBody?.content['multipart/form-data']
  if (form) return formParts(resolved(form.schema))
  const json = requestBody?.content['application/json']
  if (!json) return []
  return [
    "--header 'Content-Type: application/json'",
    `--data ${quoted(JSON.stringify(objectFor(resolved(json.schema))))}`,
  ]
}

function authorisation({ security }: Operation): string[] {
  if (security.some((way) => 'token' in way)) return ['--header "Authorization: Bearer $ESPALIER_TOKEN"']
  return security.length > 0 ? ['--cookie cookies.txt'] : []
}

/** Parts of the query that must be given. */
function queryFor({ parameters }: Operation): string {
  const needed = parameters.map((one) => resolved(one)).filter((one) => one.in === 'query' && one.required)
  const parts = needed.map(({ name, schema }) => `${name}=${encodeURIComponent(String(valueFor(name, schema)))}`)
  return parts.length > 0 ? `?${parts.join('&')}` : ''
}

/** `/api/problems/{id}` of a problem: `/api/problems/PROBLEM_ID`. */
const pathFor = (path: string): string =>
  path.replace(/([\w-]+)\/\{(\w+)\}/g, (_, owner: string, name: string) => {
    const thing = owner.replace(/s$/, '').replace('-', '_').toUpperCase()
    return `${owner}/${name === 'id' ? `${thing}_ID` : name.toUpperCase()}`
  })

/** A line for a shell: the request with what must be given, capitals to be replaced. */
export function exampleOf(method: string, path: string, operation: Operation): string {
  return [
    'curl',
    ...(method === 'GET' ? [] : [`--request ${method}`]),
    `"$ESPALIER_URL${pathFor(path)}${queryFor(operation)}"`,
    ...authorisation(operation),
    ...bodyParts(operation),
  ].join(' ')
}
