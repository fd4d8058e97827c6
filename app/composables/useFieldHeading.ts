import type { MaybeRefOrGetter } from 'vue'

interface FieldHeading { owner: string, text: string }

/** What stands in the bar of the field now. Only the layout reads it. */
export const useFieldHeadingState = () => useState<FieldHeading | null>('field-heading', () => null)

/**
 * Names the page in the field's bar and in the window's title, as long as the calling page is shown.
 *
 * @param text what the page is about, such as a sample's number
 */
export function useFieldHeading(text: MaybeRefOrGetter<string>) {
  const owner = useId()
  const heading = useFieldHeadingState()
  watchEffect(() => { heading.value = { owner, text: toValue(text) } })
  // The next page may already have put its own name there.
  onBeforeUnmount(() => { if (heading.value?.owner === owner) heading.value = null })
}
