import type { DOMWrapper } from '@vue/test-utils'
import { nextTick } from 'vue'

let at = 10_000_000

/** One tap of a person who takes a second between two: a button ignores what comes sooner as a bounce of the glove. */
export function tap(target: DOMWrapper<Element>): Promise<void> {
  at += 1000
  const event = new MouseEvent('click', { bubbles: true, cancelable: true })
  Object.defineProperty(event, 'timeStamp', { value: at })
  target.element.dispatchEvent(event)
  return nextTick()
}
