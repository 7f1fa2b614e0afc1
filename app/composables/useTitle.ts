/** Sets the document's title; the product's name follows it. */
export function useTitle(title: MaybeRefOrGetter<string>) {
  useHead({ title: computed(() => toValue(title)) })
}
