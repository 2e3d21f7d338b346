/** Signs out. */
export default definePublicRoute(async (event) => {
  await clearUserSession(event)
  return { ok: true }
})
