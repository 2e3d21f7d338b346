import { tagsInUse } from '../../services/library'

/** Tags in use in the workspace, in alphabetical order: `[{tag, count}]`. */
export default defineRoute('member', (_event, { app, ...actor }) => tagsInUse(app, actor))
