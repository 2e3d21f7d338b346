import { standInsOf } from '../../services/stand-ins'

/** Whose reviews are in whose hands, now and to come, the earliest first; days are of UTC. */
export default defineRoute('member', async (_event, { app, ...actor }) => ({
  items: await standInsOf(app, actor),
  nextCursor: null,
}))
