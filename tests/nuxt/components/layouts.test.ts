import { mountSuspended } from '@nuxt/test-utils/runtime'
import { afterEach, describe, expect, it } from 'vitest'
import { defineComponent, h, nextTick, ref } from 'vue'
import FieldLayout from '~/layouts/field.vue'

afterEach(() => {
  localStorage.clear()
  usePreferencesStore().setTheme('day')
})

describe('the field layout', () => {
  it('names the page as the page says, and forgets it with the page', async () => {
    const isShown = ref(true)
    const text = ref('Sheet 1042-07')
    const Page = defineComponent({
      setup() {
        useFieldHeading(text)
        return () => h('p', 'content')
      },
    })
    const layout = await mountSuspended(FieldLayout, { slots: { default: () => isShown.value ? h(Page) : h('p', 'other') } })
    await nextTick()
    expect(layout.get('h1').text()).toBe('Sheet 1042-07')
    text.value = 'Sheet 1042-08'
    await nextTick()
    expect(layout.get('h1').text()).toBe('Sheet 1042-08')
    isShown.value = false
    await nextTick()
    await nextTick()
    expect(layout.get('h1').text()).toBe('Lapel')
  })

  it('changes the theme with one tap, on a button that says to which', async () => {
    const layout = await mountSuspended(FieldLayout)
    const toggle = layout.findAll('button').find(button => button.text().includes('Change to theme'))
    expect(toggle?.text()).toBe('Change to theme Sun')
    await toggle?.trigger('click')
    expect(document.documentElement.dataset.theme).toBe('sun')
    expect(toggle?.text()).toBe('Change to theme Day')
  })

  it('has a place for the state of sending, and a way past the bars', async () => {
    const layout = await mountSuspended(FieldLayout)
    expect(layout.get('header a[href="/field/waiting"]').text()).toContain('Fetching')
    expect(layout.get('a[href="#main"]').text()).toBe('Skip to the page')
    expect(layout.get('main').attributes('id')).toBe('main')
  })
})
