import ts from 'typescript'
import type { JsonSchema } from './json-schema'
import { anyOf, described } from './json-schema'

const BYTES = /^(Uint8Array|Buffer|ArrayBuffer)$/
const NOTHING = ts.TypeFlags.Undefined | ts.TypeFlags.Void | ts.TypeFlags.Never
const ANYTHING = ts.TypeFlags.Any | ts.TypeFlags.Unknown

/** Types that stand for bytes or text of a file, and not for JSON. */
export const isFile = (type: ts.Type): boolean =>
  Boolean(type.flags & ts.TypeFlags.String) || BYTES.test(type.symbol?.name ?? '')

/**
 * JSON Schemas of what TypeScript types look like as JSON. Types with a name of this project become components of the
 * document, so that each is written once.
 */
export class AnswerSchemas {
  readonly components: Record<string, JsonSchema> = {}
  private readonly owners = new Map<string, ts.Symbol>()

  constructor(
    private readonly checker: ts.TypeChecker,
    private readonly root: string,
  ) {}

  schemaOf(type: ts.Type): JsonSchema {
    const { flags } = type
    if (flags & (ANYTHING | NOTHING)) return {}
    if (flags & ts.TypeFlags.Null) return { type: 'null' }
    if (type.isStringLiteral() || type.isNumberLiteral()) return { const: type.value }
    if (flags & ts.TypeFlags.BooleanLiteral) return { const: this.checker.typeToString(type) === 'true' }
    if (flags & ts.TypeFlags.StringLike) return { type: 'string' }
    if (flags & ts.TypeFlags.NumberLike) return { type: 'number' }
    if (flags & ts.TypeFlags.BooleanLike) return { type: 'boolean' }
    const name = this.nameOf(type)
    return name ? this.component(name, type) : this.structure(type)
  }

  /** The name of a type that this project gave it, where it is not one of many with the same name. */
  private nameOf(type: ts.Type): string | null {
    if (type.aliasTypeArguments?.length || this.checker.getTypeArguments(type as ts.TypeReference).length) return null
    const symbol = type.aliasSymbol ?? type.symbol
    const declaration = symbol?.declarations?.[0]
    if (!declaration || !declaration.getSourceFile().fileName.startsWith(this.root)) return null
    if (declaration.getSourceFile().fileName.includes('/node_modules/')) return null
    if (!ts.isInterfaceDeclaration(declaration) && !ts.isTypeAliasDeclaration(declaration)) return null
    const owner = this.owners.get(symbol.name) ?? symbol
    this.owners.set(symbol.name, owner)
    return owner === symbol ? symbol.name : null
  }

  private component(name: string, type: ts.Type): JsonSchema {
    if (!this.components[name]) {
      // In place before it is known, so that a type within itself ends here.
      this.components[name] = {}
      const symbol = type.aliasSymbol ?? type.symbol
      this.components[name] = described(this.structure(type), this.commentOf(symbol))
    }
    return { $ref: `#/components/schemas/${name}` }
  }

  private structure(type: ts.Type): JsonSchema {
    if (type.isUnion()) return this.union(type)
    if (this.checker.isTupleType(type)) return this.tuple(type as ts.TypeReference)
    if (this.checker.isArrayType(type))
      return { type: 'array', items: this.schemaOf(this.checker.getTypeArguments(type as ts.TypeReference)[0]!) }
    if (type.symbol?.name === 'Date') return { type: 'string', format: 'date-time' }
    if (type.flags & (ts.TypeFlags.Object | ts.TypeFlags.Intersection)) return this.object(type)
    return {}
  }

  private union(type: ts.UnionType): JsonSchema {
    const members = type.types.filter((member) => !(member.flags & NOTHING))
    const literals = members.filter((member) => member.isStringLiteral() || member.isNumberLiteral())
    const booleans = members.filter((member) => member.flags & ts.TypeFlags.BooleanLiteral)
    const rest = members.filter((member) => !literals.includes(member as never) && !booleans.includes(member))
    const schemas: JsonSchema[] = rest.map((member) => this.schemaOf(member))
    if (booleans.length > 0) schemas.unshift(booleans.length === 2 ? { type: 'boolean' } : this.schemaOf(booleans[0]!))
    if (literals.length > 0)
      schemas.unshift({ enum: literals.map((member) => (member as ts.StringLiteralType | ts.NumberLiteralType).value) })
    return anyOf(schemas)
  }

  private tuple(type: ts.TypeReference): JsonSchema {
    const { minLength, hasRestElement } = type.target as ts.TupleType
    const prefixItems = this.checker.getTypeArguments(type).map((item) => this.schemaOf(item))
    if (hasRestElement) return { type: 'array', items: anyOf(prefixItems) }
    return { type: 'array', prefixItems, minItems: minLength, maxItems: prefixItems.length }
  }

  private object(type: ts.Type): JsonSchema {
    const index = type.getStringIndexType() ?? type.getNumberIndexType()
    const properties: Record<string, JsonSchema> = {}
    const required: string[] = []
    for (const symbol of this.checker.getPropertiesOfType(type)) {
      const value = this.checker.getTypeOfSymbol(symbol)
      if (value.getCallSignatures().length > 0 || symbol.name.startsWith('__@')) continue
      properties[symbol.name] = described(this.schemaOf(value), this.commentOf(symbol))
      const mayLack = value.isUnion() && value.types.some((member) => member.flags & ts.TypeFlags.Undefined)
      if (!(symbol.flags & ts.SymbolFlags.Optional) && !mayLack && !(value.flags & ANYTHING)) required.push(symbol.name)
    }
    return {
      type: 'object',
      ...(Object.keys(properties).length > 0 ? { properties } : {}),
      ...(required.length > 0 ? { required } : {}),
      ...(index ? { additionalProperties: this.schemaOf(index) } : {}),
    }
  }

  private commentOf(symbol: ts.Symbol): string {
    return ts.displayPartsToString(symbol.getDocumentationComment(this.checker)).replace(/\s*\n\s*/g, ' ')
  }
}
