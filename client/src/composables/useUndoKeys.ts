import { onScopeDispose } from 'vue'

/** Ctrl+Z and Ctrl+Y outside of entries, which undo what is typed in them by themselves. */
export function useUndoKeys(undo: () => void, redo: () => void): void {
  function onKey(event: KeyboardEvent) {
    const inEntry = event.target instanceof Element && event.target.matches('input, textarea, select, [contenteditable]')
    if (!(event.ctrlKey || event.metaKey) || event.altKey || inEntry) return
    const key = event.key.toLowerCase()
    const action = key === 'y' || (key === 'z' && event.shiftKey) ? redo : key === 'z' ? undo : null
    if (!action) return
    event.preventDefault()
    action()
  }
  addEventListener('keydown', onKey)
  onScopeDispose(() => removeEventListener('keydown', onKey))
}
