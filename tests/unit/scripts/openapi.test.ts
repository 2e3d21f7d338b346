import { readdirSync, readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import { Validator } from '@seriousme/openapi-schema-validator'
import { describe, expect, it } from 'vitest'
import { documentText } from '../../../scripts/openapi/document'

const root = resolve(import.meta.dirname, '../../..')
const text = readFileSync(resolve(root, 'docs/openapi.json'), 'utf8')

interface Operation {
  operationId: string
  summary: string
  'x-allowed': unknown
  security: unknown[]
  parameters: { name: string; in: string; required: boolean; description?: string }[]
  requestBody?: { content: Record<string, { schema: Record<string, unknown> }> }
  responses: Record<string, { content?: Record<string, { schema: unknown }> }>
}
interface Schema {
  required?: string[]
  properties?: Record<string, { description?: string; anyOf?: unknown; type?: unknown; enum?: unknown }>
}
const { paths, components } = JSON.parse(text) as {
  paths: Record<string, Record<string, Operation>>
  components: { schemas: Record<string, Schema> }
}

describe('the OpenAPI document', () => {
  it('is what the route files say today: `npm run openapi` writes it anew', async () => {
    expect(await documentText(root)).toBe(text)
  }, 120_000)

  it('is one by an outside judge', async () => {
    expect(await new Validator().validate(JSON.parse(text))).toEqual({ valid: true })
  })

  it('has every route once, under a name of its own', () => {
    const files = readdirSync(resolve(root, 'server/api'), { recursive: true, encoding: 'utf8' })
    const operations = Object.values(paths).flatMap((path) => Object.values(path))
    expect(operations.length).toBe(files.filter((name) => name.endsWith('.ts')).length)
    expect(new Set(operations.map(({ operationId }) => operationId)).size).toBe(operations.length)
    for (const { summary, operationId } of operations) expect(summary.length, operationId).toBeGreaterThan(5)
  })

  it('says who may call', () => {
    const approve = paths['/api/run-sheets/{id}/approve']!.post!
    expect(approve['x-allowed']).toEqual(['reviewer'])
    expect(approve.security).toEqual([{ token: [] }, { session: [] }])
    expect(paths['/api/tokens']!.get!.security).toEqual([{ session: [] }])
    expect(paths['/api/health']!.get!.security).toEqual([])
  })

  it('says what is taken, with what the schemas and the comments beside them say', () => {
    const { required, properties } = components.schemas.CreateTokenRequest!
    expect(required).toEqual(['name', 'role'])
    expect(properties!.role!.description).toBe('The one role that it acts in: of those its maker holds.')
    const library = paths['/api/problems']!.get!.parameters
    expect(library.find(({ name }) => name === 'tag')).toMatchObject({ in: 'query', required: false })
    expect(library.filter(({ name }) => name === 'limit' || name === 'cursor').length).toBe(2)
    const upload = paths['/api/run-sheets/{id}/returns']!.post!.requestBody!.content
    expect(upload['multipart/form-data']!.schema).toMatchObject({ required: ['file'] })
    expect(Object.keys(paths['/api/machines']!.post!.requestBody!.content)).toEqual([
      'application/json',
      'multipart/form-data',
    ])
  })

  it('says where a key makes it safe to ask again', () => {
    const key = { $ref: '#/components/parameters/IdempotencyKey' }
    expect(paths['/api/run-sheets']!.post!.parameters).toContainEqual(key)
    expect(paths['/api/returns/{id}/answer-sheet']!.post!.parameters).not.toContainEqual(key)
    expect(paths['/api/tokens']!.post!.parameters).not.toContainEqual(key)
  })

  it('says what is answered, by status and kind', () => {
    const { responses } = paths['/api/problems']!.post!
    expect(Object.keys(responses)).toEqual(['200', '201', '400', '401', '403', '409', '413', '422', '429'])
    expect(responses['201']!.content!['application/json']!.schema).toEqual({
      $ref: '#/components/schemas/UploadedProblem',
    })
    expect(Object.keys(paths['/api/run-sheets/{id}/programmed']!.get!.responses['200']!.content!)).toEqual([
      'application/json',
      'text/csv',
      'text/plain',
    ])
    const { properties, required } = components.schemas.TokenView!
    expect(required).toContain('usedAt')
    expect(properties!.usedAt).toEqual({
      type: ['string', 'null'],
      description: 'To the minute; null before its first use.',
    })
  })
})
