/** Sets the document's title, "page · Semilatus". */
export function useTitle(title: MaybeRefOrGetter<string>) {
  useHead({ title: computed(() => `${toValue(title)} · Semilatus`) })
}
