import document from '../../docs/openapi.json'

/** This document: every route with who may call it, what it takes and what it answers, as OpenAPI 3.1; public. */
export default definePublicRoute((): Record<string, unknown> => document)
