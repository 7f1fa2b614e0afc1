/** Where to go after signing in: the address that was asked for, if it is one of ours. */
export function useNextAddress() {
  const route = useRoute()
  return computed(() => safeNext(route.query.next))
}

/** An address inside this site; anything else becomes the given one, so that a link cannot lead elsewhere after sign-in. */
export function safeNext(next: unknown, otherwise = '/'): string {
  return typeof next === 'string' && /^\/(?![/\\])/.test(next) ? next : otherwise
}
