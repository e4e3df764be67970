/** Spares a visitor a desk page that would be empty. The real guard stands at every route of the server. */
export default defineNuxtRouteMiddleware(async (to) => {
  if (useError().value) return
  const access = to.meta.access
  if (access === undefined || access === 'public') return
  const me = await useMe().load()
  if (!me.signedIn) return navigateTo({ path: '/sign-in', query: { callbackUrl: to.fullPath } })
  if (Array.isArray(access) && !access.some(role => me.roles.includes(role))) return abortNavigation({ statusCode: 404, statusMessage: 'Not found' })
})
