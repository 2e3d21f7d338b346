/** A route of the HTTP interface in the list of all. */
export interface RouteItem {
  /** Name of its own, also its anchor on the page: `postEmbeddings`. */
  id: string
  method: string
  /** With parts such as `{id}`. */
  path: string
  summary: string
}

/** Routes under one first part of their path. */
export interface RouteGroup {
  name: string
  routes: RouteItem[]
}

export interface RouteList {
  introduction: string
  groups: RouteGroup[]
}

/** A field of a request or an answer. */
export interface RouteField {
  /** Its name, `[]` for the entries of a list; within another field as deep as `depth` says. */
  name: string
  depth: number
  type: string
  /** Range, length, default, choices: whatever narrows the type. */
  limits: string
  required: boolean
  description: string
}

export interface RouteContent {
  /** Media type. */
  media: string
  /** What it is where it has no fields: `list of numbers`. */
  type: string
  fields: RouteField[]
}

export interface RouteAnswer {
  status: number
  description: string
  contents: RouteContent[]
}

/** All that is to be known of one route. */
export interface RouteView extends RouteItem {
  description: string
  /** Who may call it, as a sentence. */
  access: string
  /** In the path, in the query and in the head of the request. */
  parameters: (RouteField & { place: string })[]
  takes: RouteContent[]
  answers: RouteAnswer[]
  errors: { status: number; description: string }[]
  /** A line for a shell, with `curl`. */
  example: string
}
