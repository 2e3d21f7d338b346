import { readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import Ajv2020 from 'ajv/dist/2020.js'
import { describe, expect, it } from 'vitest'
import { routeList, routeView } from '../../../../server/services/route-reference'
import { document, resolved } from '../../../../server/services/route-reference/document'
import { objectFor } from '../../../../server/services/route-reference/example'
import { fieldsOf, limitsOf, typeOf } from '../../../../server/services/route-reference/fields'

const items = routeList().groups.flatMap(({ routes }) => routes)
const fileText = readFileSync(resolve(import.meta.dirname, '../../../../docs/openapi.json'), 'utf8')

describe('the reference of the routes', () => {
  it('has every route of the document once, each with all that is said of it', () => {
    expect(items.length).toBe(Object.values(document.paths).flatMap((path) => Object.values(path)).length)
    expect(new Set(items.map(({ id }) => id)).size).toBe(items.length)
    for (const { id, method, path } of items) {
      const view = routeView(id)
      expect(view, id).toMatchObject({ method, path })
      expect(view.access, id).toMatch(/\.$/)
      expect(view.answers.length, id).toBeGreaterThan(0)
      expect(view.example, id).toMatch(/^curl /)
    }
  })

  it('says types and ranges', () => {
    const view = routeView('postEmbeddings')
    const tries = view.takes[0]!.fields.find(({ name }) => name === 'tries')
    expect(tries).toMatchObject({
      type: 'whole number',
      limits: '1 to 1\u202f000; default 8',
      required: false,
      depth: 0,
    })
    const work = view.takes[0]!.fields.find(({ name }) => name === 'work')
    expect(work).toMatchObject({ type: 'one of', limits: '"repair", "shorten"', depth: 1 })
    expect(view.parameters[0]).toMatchObject({ name: 'Idempotency-Key', place: 'header' })
    expect(view.access).toBe('Roles: developer, owner.')
    expect(view.errors.map(({ status }) => status)).toContain(422)
  })

  it('reads lists, choices of shapes, and bounds at the edge of what is exact', () => {
    expect(typeOf({ type: 'array', items: { type: 'object', properties: {} } })).toBe('list of objects')
    expect(typeOf({ anyOf: [{ type: 'string' }, { type: 'null' }] })).toBe('text or null')
    expect(limitsOf({ type: 'integer', minimum: 0, maximum: Number.MAX_SAFE_INTEGER })).toBe('at least 0')
    expect(limitsOf({ anyOf: [{ type: 'string', maxLength: 9 }, { type: 'null' }] })).toBe('at most 9 characters')
    const shapes: Parameters<typeof fieldsOf>[0] = {
      anyOf: [{ properties: { a: {} } }, { properties: { b: { properties: { c: {} } } } }],
    }
    expect(fieldsOf(shapes).map(({ name, depth }) => `${depth}${name}`)).toEqual(['0a', '0b', '1c'])
  })

  it('gives examples that the schemas take', () => {
    const ajv = new Ajv2020({ strict: false, validateFormats: false, validateSchema: false })
    ajv.addSchema(JSON.parse(fileText) as object, 'document')
    const wrong: string[] = []
    for (const [path, operations] of Object.entries(document.paths))
      for (const [method, { requestBody }] of Object.entries(operations)) {
        if (!requestBody?.content['application/json']) continue
        const at = `paths/${path.replaceAll('/', '~1').replaceAll('{', '%7B').replaceAll('}', '%7D')}/${method}`
        const takes = ajv.compile({ $ref: `document#/${at}/requestBody/content/application~1json/schema` })
        const example = objectFor(resolved(requestBody.content['application/json'].schema))
        if (!takes(example)) wrong.push(`${method} ${path}: ${ajv.errorsText(takes.errors)} ${JSON.stringify(example)}`)
      }
    expect(wrong).toEqual([])
  })

  it('writes lines that a shell takes apart as meant', () => {
    expect(routeView('postTokens').example).toBe(
      `curl --request POST "$ESPALIER_URL/api/tokens" --cookie cookies.txt --header 'Content-Type: application/json' --data '{"name":"name","role":"owner"}'`,
    )
    expect(routeView('getProblemsById').example).toBe(
      'curl "$ESPALIER_URL/api/problems/PROBLEM_ID" --header "Authorization: Bearer $ESPALIER_TOKEN"',
    )
    expect(routeView('postProblems').example).toContain("--form 'file=@FILE'")
    expect(routeView('getHealth').example).toBe('curl "$ESPALIER_URL/api/health"')
  })

  it('says that there is no such route', () => {
    expect(() => routeView('nothing')).toThrow('There is no route of this name.')
  })
})
