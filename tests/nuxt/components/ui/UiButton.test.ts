import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import UiButton from '~/components/ui/UiButton.vue'

/** A press at a given time, as the browser stamps it. */
function pressAt(button: Element, milliseconds: number) {
  const event = new MouseEvent('click', { bubbles: true, cancelable: true })
  Object.defineProperty(event, 'timeStamp', { value: milliseconds })
  button.dispatchEvent(event)
  return event
}

describe('UiButton', () => {
  it('takes a second tap within 400 ms for the same tap', async () => {
    const button = await mountSuspended(UiButton, { slots: { default: () => 'Start' } })
    pressAt(button.element, 1000)
    const bounced = pressAt(button.element, 1399)
    expect(button.emitted('click')).toHaveLength(1)
    expect(bounced.defaultPrevented).toBe(true)
    pressAt(button.element, 1401)
    expect(button.emitted('click')).toHaveLength(2)
  })

  it('lets the keys of a keypad repeat as fast as fingers do', async () => {
    const key = await mountSuspended(UiButton, { props: { repeats: true }, slots: { default: () => '0' } })
    pressAt(key.element, 1000)
    pressAt(key.element, 1080)
    expect(key.emitted('click')).toHaveLength(2)
  })

  it('ignores presses while busy, keeps its words and says so', async () => {
    const button = await mountSuspended(UiButton, { props: { busy: true }, slots: { default: () => 'Hand in' } })
    const event = pressAt(button.element, 1000)
    expect(button.emitted('click')).toBeUndefined()
    expect(event.defaultPrevented).toBe(true)
    expect(button.text()).toBe('Hand in')
    expect(button.attributes('aria-busy')).toBe('true')
    expect(button.attributes('disabled')).toBeUndefined()
  })

  it('is a link when it leads somewhere, and a button that submits nothing by itself otherwise', async () => {
    const link = await mountSuspended(UiButton, { props: { to: '/field' }, slots: { default: () => 'Today' } })
    expect(link.element.tagName).toBe('A')
    expect(link.attributes('href')).toBe('/field')
    expect(link.attributes('type')).toBeUndefined()
    const button = await mountSuspended(UiButton)
    expect(button.attributes('type')).toBe('button')
  })
})
