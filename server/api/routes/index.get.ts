import { routeList } from '../../services/route-reference'

/** Every route of this server by the first part of its path, for the reference page: `{introduction, groups[]}`. */
export default definePublicRoute(() => routeList())
