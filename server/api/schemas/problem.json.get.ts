import { setResponseHeader } from 'h3'
import schema from '../../../docs/problem.schema.json'

/** The JSON Schema of the JSON documents that problems are read from and written to; public, for editors to fetch. */
export default definePublicRoute((event) => {
  setResponseHeader(event, 'content-type', 'application/schema+json; charset=utf-8')
  return schema
})
