import { useEventListener, useLocalStorage } from '@vueuse/core'

/** Keys by what `KeyboardEvent.key` says. */
export type Shortcuts = Readonly<Record<string, () => void>>

/**
 * Single keys that act on an office page. Off where someone types, where a dialog is open, with any modifier held, and
 * altogether when the person has switched them off (WCAG 2.1.4); that choice is kept on this computer.
 */
export function useShortcuts(shortcuts: Shortcuts) {
  const isOn = useLocalStorage('lapel-office-shortcuts', true, { initOnMounted: true })

  function onKey(event: KeyboardEvent) {
    if (!isOn.value || event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey || isTyping(event.target)) return
    if (document.querySelector('dialog[open]')) return
    const act = Object.hasOwn(shortcuts, event.key) ? shortcuts[event.key] : undefined
    if (!act) return
    event.preventDefault()
    act()
  }

  if (import.meta.client) useEventListener(window, 'keydown', onKey)
  return { isOn }
}

function isTyping(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && (target.isContentEditable || target.matches('input, textarea, select'))
}
