import { routeView } from '../../services/route-reference'

/** One route with who may call it, what it takes and answers, and an example, by its name in the OpenAPI document. */
export default definePublicRoute((event) => routeView(partOf(event, 'id')))
