/** The measure chosen on a sheet, kept in the address (?measure=) so that it can be sent to somebody. */
export function useChosenMeasure(known: () => readonly { id: string }[]) {
  const route = useRoute()
  const router = useRouter()

  const chosen = computed(() => {
    const asked = route.query.measure
    return typeof asked === 'string' && known().some(measure => measure.id === asked) ? asked : null
  })

  function choose(id: string | null) {
    if (id === chosen.value) return
    router.replace({ query: { ...route.query, measure: id ?? undefined }, hash: route.hash })
  }

  return { chosen, choose }
}
