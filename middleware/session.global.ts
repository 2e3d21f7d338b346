const OPEN = ['/sign-in', '/setup', '/reset']
/** What is behind a secret link is for people who are not signed in, or have no account. */
const SHARED = ['/answers/', '/invitations/', '/reset/', '/address/']

/** Sends visitors without a session to the sign-in page, and back to where they wanted to go afterwards. */
export default defineNuxtRouteMiddleware(async (to) => {
  if (OPEN.includes(to.path) || SHARED.some((folder) => to.path.startsWith(folder))) return
  const { session, load } = useSession()
  if (!session.value) await load()
  if (!session.value) return navigateTo({ path: '/sign-in', query: to.path === '/' ? {} : { next: to.fullPath } })
})
