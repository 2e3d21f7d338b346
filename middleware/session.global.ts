const OPEN = ['/sign-in', '/setup']
/** Answers behind a link are for people without an account. */
const SHARED = '/answers/'

/** Sends visitors without a session to the sign-in page, and back to where they wanted to go afterwards. */
export default defineNuxtRouteMiddleware(async (to) => {
  if (OPEN.includes(to.path) || to.path.startsWith(SHARED)) return
  const { session, load } = useSession()
  if (!session.value) await load()
  if (!session.value) return navigateTo({ path: '/sign-in', query: to.path === '/' ? {} : { next: to.fullPath } })
})
