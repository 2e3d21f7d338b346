/** Signs out: the session of this browser ends. */
export default definePublicRoute(async (event, app) => {
  await leave(event, app)
  return { ok: true }
})
