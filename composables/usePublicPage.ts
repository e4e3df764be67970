/** A page that is the same for everybody: caches may keep it, and it is right again within five seconds of a change. */
export function usePublicPage() {
  const event = useRequestEvent()
  if (event) event.node.res.setHeader('cache-control', 'public, max-age=5')
}
