/** One parameter of the page's address as text, '' where it is missing. */
export function useQueryText(name: string) {
  const route = useRoute()
  return computed(() => {
    const value = route.query[name]
    return (Array.isArray(value) ? value[0] : value) ?? ''
  })
}
