import { mountSuspended } from '@nuxt/test-utils/runtime'
import { afterEach, describe, expect, it, vi } from 'vitest'
import FieldMoment from '~/components/field/FieldMoment.vue'
import { wordsOf } from '../../words-of'

type Props = InstanceType<typeof FieldMoment>['$props']

async function mountMoment(props: Partial<Props> = {}) {
  const save = vi.fn<(at: string | null) => Promise<unknown>>(async () => true)
  const moment = await mountSuspended(FieldMoment, { props: { label: 'Shift starts', value: null, zone: 'Europe/Dublin', nowAt: '2026-07-03T09:00:00.000Z', save, ...props } as Props })
  const input = () => moment.get<HTMLInputElement>('input[type=time]')
  return { moment, save, input }
}

afterEach(() => { vi.useRealTimers() })

describe('FieldMoment', () => {
  it('writes the local time of the place down as an instant when the field is left', async () => {
    const { save, input } = await mountMoment()
    await input().setValue('07:30')
    await input().trigger('blur')
    expect(save).toHaveBeenCalledExactlyOnceWith('2026-07-03T06:30:00.000Z')
  })

  it('writes it down after a rest too, before the field is left', async () => {
    const { save, input } = await mountMoment()
    vi.useFakeTimers()
    await input().setValue('07:30')
    expect(save).not.toHaveBeenCalled()
    await vi.advanceTimersByTimeAsync(2000)
    expect(save).toHaveBeenCalledExactlyOnceWith('2026-07-03T06:30:00.000Z')
  })

  it('does not lose a time when the page goes away with the field still focused', async () => {
    const { moment, save, input } = await mountMoment()
    await input().setValue('07:30')
    moment.unmount()
    expect(save).toHaveBeenCalledExactlyOnceWith('2026-07-03T06:30:00.000Z')
  })

  it('takes an end before the start for one of the next day', async () => {
    const { save, input } = await mountMoment({ label: 'Shift ends', dayAfter: '2026-07-03T21:00:00.000Z' })
    await input().setValue('06:00')
    await input().trigger('blur')
    expect(save).toHaveBeenCalledExactlyOnceWith('2026-07-04T05:00:00.000Z')
  })

  it('writes nothing anew that stands already, and says what was not kept', async () => {
    const { moment, save, input } = await mountMoment({ value: '2026-07-03T06:30:00.000Z' })
    await input().trigger('blur')
    expect(save).not.toHaveBeenCalled()
    save.mockResolvedValueOnce(false)
    await input().setValue('08:00')
    await input().trigger('blur')
    await expect.poll(() => wordsOf(moment.element)).toContain('Not saved. Try again.')
    expect(input().element.value).toBe('08:00')
  })
})
