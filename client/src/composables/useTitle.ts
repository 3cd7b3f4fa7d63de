import { toValue, watchEffect, type MaybeRefOrGetter } from 'vue'

const NAME = 'Dotside'

/** Names the window after what is on the sheet; empty leaves the program's name alone. */
export function useTitle(title: MaybeRefOrGetter<string>): void {
  watchEffect(() => {
    const text = toValue(title)
    document.title = text === '' ? NAME : `${text} – ${NAME}`
  })
}
