/** The present instant (ISO 8601): the same in the server's render and the browser's first, then moving on every minute. */
export function useNow() {
  const now = useState('now', () => new Date().toISOString())
  useIntervalFn(() => {
    now.value = new Date().toISOString()
  }, 60_000)
  return now
}
