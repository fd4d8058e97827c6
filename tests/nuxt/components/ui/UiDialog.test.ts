import { mountSuspended } from '@nuxt/test-utils/runtime'
import { afterEach, describe, expect, it } from 'vitest'
import { h, nextTick } from 'vue'
import UiDialog from '~/components/ui/UiDialog.vue'

const opener = document.createElement('button')

async function mountDialog(props: Record<string, unknown> = {}) {
  document.body.append(opener)
  opener.focus()
  return mountSuspended(UiDialog, {
    props: { open: false, title: 'Pause W-03', description: 'The clock stops now.', ...props },
    slots: { default: () => h('input', { id: 'reason' }), actions: () => h('button', 'Pause') },
    attachTo: document.body,
  })
}

afterEach(() => { document.body.replaceChildren() })

describe('UiDialog', () => {
  it('opens as a modal named by its title and takes the focus to it, not to a field that calls up the keyboard', async () => {
    const dialog = await mountDialog()
    expect(dialog.get('dialog').attributes('open')).toBeUndefined()
    await dialog.setProps({ open: true })
    await nextTick()
    const element = dialog.get('dialog')
    expect(element.attributes('open')).toBeDefined()
    const title = document.getElementById(element.attributes('aria-labelledby') ?? '')
    expect(title?.textContent?.trim()).toBe('Pause W-03')
    expect(document.activeElement).toBe(title)
    expect(document.getElementById(element.attributes('aria-describedby') ?? '')?.textContent?.trim()).toBe('The clock stops now.')
    dialog.unmount()
  })

  it('closes on Esc, and not while its action is under way', async () => {
    const dialog = await mountDialog({ busy: true })
    await dialog.setProps({ open: true })
    await dialog.get('dialog').trigger('cancel')
    expect(dialog.emitted('update:open')).toBeUndefined()
    await dialog.setProps({ busy: false })
    await dialog.get('dialog').trigger('cancel')
    expect(dialog.emitted('update:open')?.at(-1)).toEqual([false])
    dialog.unmount()
  })

  it('tells that it closed, and forgets what was in it', async () => {
    const dialog = await mountDialog()
    await dialog.setProps({ open: true })
    await nextTick()
    expect(dialog.find('#reason').exists()).toBe(true)
    await dialog.setProps({ open: false })
    await nextTick()
    expect(dialog.get('dialog').attributes('open')).toBeUndefined()
    expect(dialog.emitted('close')).toHaveLength(1)
    expect(dialog.find('#reason').exists()).toBe(false)
    dialog.unmount()
  })
})
