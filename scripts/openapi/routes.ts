import { readdirSync } from 'node:fs'
import { join, relative } from 'node:path'
import ts from 'typescript'
import { AnswerSchemas, isFile } from './answer-schemas'
import type { JsonSchema } from './json-schema'
import { anyOf } from './json-schema'
import type { SchemaSource } from './request-schemas'
import { commentsIn } from './request-schemas'

/** What a route file says of itself. */
export interface Route {
  /** Of the file under server/api. */
  file: string
  method: string
  /** `/api/problems/{id}/graph` */
  path: string
  comment: string
  /** Who may call it: anybody, any member, or who holds one of these roles. */
  allowed: 'anybody' | 'member' | string[]
  /** For people who are signed in, and not for tokens. */
  sessionOnly: boolean
  body: SchemaSource | null
  query: SchemaSource | null
  form: SchemaSource | null
  /** Asked again under a key, it answers the same and does nothing. */
  takesKey: boolean
  /** The form has to have a file, and not something in its place. */
  needsFile: boolean
  /** Statuses of success. */
  statuses: number[]
  answer: JsonSchema | null
  /** Media types of what is no JSON. */
  media: string[]
}

const DEFINERS = ['defineRoute', 'defineSessionRoute', 'definePublicRoute']

/** The compiler's view of the server, from the settings that Nuxt wrote. */
function compiled(root: string): ts.Program {
  const path = join(root, '.nuxt/tsconfig.server.json')
  const { config } = ts.readConfigFile(path, (file) => ts.sys.readFile(file)) as { config: unknown }
  const { options, fileNames } = ts.parseJsonConfigFileContent(config, ts.sys, join(root, '.nuxt'))
  return ts.createProgram(fileNames, { ...options, noEmit: true })
}

function methodAndPath(file: string): { method: string; path: string } {
  const [, stem, method] = /^(.*)\.(get|post|put|patch|delete)\.ts$/.exec(file) ?? []
  if (!stem || !method) throw new Error(`${file} names no method`)
  return { method, path: `/api/${stem.replace(/(^|\/)index$/, '').replace(/\[(\w+)\]/g, '{$1}')}` }
}

function callsIn(node: ts.Node): ts.CallExpression[] {
  const calls: ts.CallExpression[] = []
  const visit = (inner: ts.Node): void => {
    if (ts.isCallExpression(inner)) calls.push(inner)
    ts.forEachChild(inner, visit)
  }
  visit(node)
  return calls
}

function stringsIn(node: ts.Node | undefined): string[] {
  if (!node) return []
  if (ts.isStringLiteral(node)) return [node.text]
  if (ts.isConditionalExpression(node)) return [...stringsIn(node.whenTrue), ...stringsIn(node.whenFalse)]
  return []
}

/** Reads one route file. */
class RouteReader {
  private readonly calls: ts.CallExpression[]
  private readonly definition: ts.CallExpression

  constructor(
    private readonly checker: ts.TypeChecker,
    private readonly source: ts.SourceFile,
    private readonly answers: AnswerSchemas,
  ) {
    const assignment = source.statements.find(ts.isExportAssignment)
    const definition = assignment?.expression
    if (!definition || !ts.isCallExpression(definition) || !DEFINERS.includes(definition.expression.getText()))
      throw new Error(`${source.fileName} defines no route`)
    this.definition = definition
    this.calls = callsIn(definition)
  }

  read(file: string): Route {
    const definer = this.definition.expression.getText()
    return {
      file,
      ...methodAndPath(file),
      comment: this.comment(),
      allowed: definer === 'definePublicRoute' ? 'anybody' : this.allowed(),
      sessionOnly: definer === 'defineSessionRoute',
      takesKey: definer === 'defineRoute' && file.endsWith('.post.ts') && this.definition.arguments.length === 2,
      body: this.schemaGivenTo('bodyOf', 1),
      query: this.schemaGivenTo('queryOf', 1),
      form: this.schemaGivenTo('parse', 0),
      needsFile: this.named('requireFile').length > 0,
      statuses: this.statuses(),
      answer: this.answer(),
      media: this.media(),
    }
  }

  private named = (name: string): ts.CallExpression[] => this.calls.filter((call) => call.expression.getText() === name)

  private comment(): string {
    const assignment = this.definition.parent
    const [doc] = ts.getJSDocCommentsAndTags(assignment).filter(ts.isJSDoc)
    return (ts.getTextOfJSDocComment(doc?.comment) ?? '').replace(/\s*\n\s*/g, ' ').trim()
  }

  private allowed(): 'member' | string[] {
    const first = this.definition.arguments[0]!
    if (ts.isStringLiteral(first)) return 'member'
    if (!ts.isArrayLiteralExpression(first)) throw new Error(`${this.source.fileName}: write the roles as a list`)
    return first.elements.flatMap((element) => stringsIn(element))
  }

  private schemaGivenTo(callee: string, at: number): SchemaSource | null {
    const argument = this.named(callee)[0]?.arguments[at]
    if (!argument) return null
    const local = this.checker.getSymbolAtLocation(argument)
    const symbol = local && local.flags & ts.SymbolFlags.Alias ? this.checker.getAliasedSymbol(local) : local
    const declaration = symbol?.declarations?.[0]
    if (!symbol || !declaration) throw new Error(`${this.source.fileName}: give ${callee} a schema by its name`)
    const comments = commentsIn(this.checker, this.checker.getTypeAtLocation(argument))
    return { file: declaration.getSourceFile().fileName, name: symbol.name, comments }
  }

  /** What is set within a condition is only one of the answers. */
  private statuses(): number[] {
    const set = this.named('setResponseStatus')
    const isAlways = set.some((call) => !ts.isIfStatement(call.parent.parent))
    const statuses = set.map((call) => Number(call.arguments[1]!.getText()))
    return [...new Set(isAlways ? statuses : [200, ...statuses])].sort((a, b) => a - b)
  }

  /** The handler's own, or what work with progress comes to. */
  private answerType(): ts.Type {
    const worker = this.named('answerWithProgress')[0]?.arguments[1]
    const work = worker ?? this.definition.arguments.find((argument) => ts.isArrowFunction(argument))!
    const signature = this.checker.getTypeAtLocation(work).getCallSignatures()[0]!
    const returned = this.checker.getReturnTypeOfSignature(signature)
    return this.checker.getAwaitedType(returned) ?? returned
  }

  private answer(): JsonSchema | null {
    const type = this.answerType()
    const members = type.isUnion() ? type.types : [type]
    const json = members.filter(
      (member) => !isFile(member) && !(member.flags & (ts.TypeFlags.Void | ts.TypeFlags.Undefined)),
    )
    if (json.length === 0) return null
    return json.length === members.length
      ? this.answers.schemaOf(type)
      : anyOf(json.map((one) => this.answers.schemaOf(one)))
  }

  private media(): string[] {
    const sent = this.named('sendFile').flatMap((call) => {
      const given = stringsIn(call.arguments[2])
      // Which it is depends on what is asked for.
      return given.length > 0 ? given : ['*/*']
    })
    const set = this.named('setResponseHeader').flatMap((call) =>
      stringsIn(call.arguments[1])[0] === 'content-type' ? stringsIn(call.arguments[2]) : [],
    )
    const packed = this.named('sendPacked').flatMap((call) => stringsIn(call.arguments[1]))
    const streams = [
      ...(this.named('openEventStream').length > 0 ? ['text/event-stream'] : []),
      ...(this.named('answerWithProgress').length > 0 ? ['application/x-ndjson'] : []),
    ]
    return [...new Set([...sent, ...packed, ...set.map((type) => type.split(';')[0]!), ...streams])]
  }
}

/** Every route, by path and method, and the components that their answers are written with. */
export function readRoutes(root: string): { routes: Route[]; components: Record<string, JsonSchema> } {
  const program = compiled(root)
  const checker = program.getTypeChecker()
  const answers = new AnswerSchemas(checker, root)
  const folder = join(root, 'server/api')
  const files = readdirSync(folder, { recursive: true, encoding: 'utf8' }).filter((name) => name.endsWith('.ts'))
  const routes = files.sort().map((file) => {
    const source = program.getSourceFile(join(folder, file))
    if (!source) throw new Error(`${relative(root, join(folder, file))} is not part of the server`)
    return new RouteReader(checker, source, answers).read(file)
  })
  return { routes, components: answers.components }
}
