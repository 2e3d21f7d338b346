import { DomainError } from '../../../shared/errors'
import type { RouteGroup, RouteItem, RouteList, RouteView } from '../../../shared/schemas/route-reference'
import type { Operation } from './document'
import { document, resolved } from './document'
import { exampleOf } from './example'
import { contentsOf, limitsOf, typeOf } from './fields'

const METHODS = ['GET', 'POST', 'PUT', 'PATCH', 'DELETE']

interface Route extends RouteItem {
  operation: Operation
}

const ROUTES: readonly Route[] = Object.entries(document.paths).flatMap(([path, operations]) =>
  Object.entries(operations)
    .map(([method, operation]) => ({
      ...{ id: operation.operationId, method: method.toUpperCase(), path },
      ...{ summary: operation.summary, operation },
    }))
    .sort((a, b) => METHODS.indexOf(a.method) - METHODS.indexOf(b.method)),
)

function grouped(): RouteGroup[] {
  const groups = new Map<string, RouteItem[]>()
  for (const { operation, ...item } of ROUTES) {
    const name = operation.tags[0]!
    groups.set(name, [...(groups.get(name) ?? []), item])
  }
  return [...groups].map(([name, routes]) => ({ name, routes }))
}

const LIST: RouteList = { introduction: document.info.description, groups: grouped() }

/** Every route, grouped by the first part of its path. */
export const routeList = (): RouteList => LIST

function parametersOf({ parameters }: Operation): RouteView['parameters'] {
  return parameters.map((one) => {
    const { name, in: place, required, description = '', schema } = resolved(one)
    return { ...{ name, place, required, description, depth: 0 }, type: typeOf(schema), limits: limitsOf(schema) }
  })
}

/** One route, by its name. @throws DomainError not found */
export function routeView(id: string): RouteView {
  const route = ROUTES.find((one) => one.id === id)
  if (!route) throw new DomainError('not found', 'route.missing', 'There is no route of this name.')
  const { operation, ...item } = route
  const at = operation.description.lastIndexOf('\n\n')
  const answers = Object.entries(operation.responses).map(([status, answer]) => ({
    ...{ status: Number(status), ...resolved(answer) },
  }))
  return {
    ...item,
    ...{ description: operation.description.slice(0, at), access: operation.description.slice(at + 2) },
    parameters: parametersOf(operation),
    takes: contentsOf(operation.requestBody?.content),
    answers: answers
      .filter(({ status }) => status < 400)
      .map(({ status, description, content }) => ({ status, description, contents: contentsOf(content) })),
    errors: answers.filter(({ status }) => status >= 400).map(({ status, description }) => ({ status, description })),
    example: exampleOf(item.method, item.path, operation),
  }
}
