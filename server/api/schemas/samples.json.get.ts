import { setResponseHeader } from 'h3'
import schema from '../../../docs/samples.schema.json'

/** The JSON Schema of the JSON documents that samples are read from; public, for editors to fetch. */
export default definePublicRoute((event) => {
  setResponseHeader(event, 'content-type', 'application/schema+json; charset=utf-8')
  return schema
})
