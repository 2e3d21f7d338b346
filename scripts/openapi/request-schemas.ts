import ts from 'typescript'
import { z } from 'zod'
import type { JsonSchema } from './json-schema'
import { described } from './json-schema'

/** Where a zod schema is kept, and what the comments beside its fields say. */
export interface SchemaSource {
  file: string
  name: string
  comments: Comments
}

interface Comments {
  text: string
  fields: Record<string, Comments>
  items?: Comments
}

/** What comments say of the fields of a schema, read from the type that the compiler gives it. */
export function commentsIn(checker: ts.TypeChecker, type: ts.Type, text = ''): Comments {
  const part = (name: string): ts.Type | undefined => {
    const symbol = type.getProperty(name)
    return symbol && checker.getTypeOfSymbol(symbol)
  }
  const fields: Record<string, Comments> = {}
  for (const field of part('shape')?.getProperties() ?? []) {
    const own = ts.displayPartsToString(field.getDocumentationComment(checker)).replace(/\s*\n\s*/g, ' ')
    fields[field.name] = commentsIn(checker, checker.getTypeOfSymbol(field), own)
  }
  if (Object.keys(fields).length > 0) return { text, fields }
  const element = part('element')
  if (element) return { text, fields, items: commentsIn(checker, element) }
  const inner = part('unwrap')?.getCallSignatures()[0]?.getReturnType()
  return inner && inner !== type ? commentsIn(checker, inner, text) : { text, fields }
}

function annotated(schema: JsonSchema, comments: Comments): JsonSchema {
  const { properties, items } = schema
  const inner: JsonSchema = {
    ...schema,
    ...(properties && {
      properties: Object.fromEntries(
        Object.entries(properties).map(([name, field]) => [
          name,
          comments.fields[name] ? annotated(field, comments.fields[name]) : field,
        ]),
      ),
    }),
    ...(items && typeof items === 'object' && comments.items ? { items: annotated(items, comments.items) } : {}),
  }
  return described(inner, comments.text)
}

/** What may be left out is found by leaving it out: fields that are worked on before they are checked do not show it. */
function required(schema: z.ZodType): { required?: string[] } {
  if (!(schema instanceof z.ZodObject)) return {}
  const fields = Object.entries(schema.shape as Record<string, z.ZodType>)
  const names = fields.filter(([, field]) => !field.safeParse(undefined).success).map(([name]) => name)
  return { required: names.length > 0 ? names : undefined }
}

/** The JSON Schema of what a zod schema takes. */
export async function requestSchema({ file, name, comments }: SchemaSource): Promise<JsonSchema> {
  const module = (await import(/* @vite-ignore */ file)) as Record<string, unknown>
  const schema = module[name]
  if (!(schema instanceof z.ZodType)) throw new Error(`${file} exports no schema ${name}`)
  const { $schema: _, ...written } = z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' })
  return annotated({ ...(written as JsonSchema), ...required(schema) }, comments)
}
