import { brokenList } from '../../../services/broken-view'

/** Embeddings that calibrations of the machine broke: damage, open run sheets, and what becomes of them. */
export default defineRoute('member', (event, { app, ...actor }) => brokenList(app, actor, partOf(event, 'id')))
