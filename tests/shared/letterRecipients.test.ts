import { describe, expect, it } from 'vitest'
import {
  recipientsStillWithout,
  type DeliveryState,
  type DeliveryView,
  type LetterRecipient,
} from '../../shared/letters.ts'

// Common practice, no source: one carer gets one copy, unless the first never arrived.
const carer = (guardianId: string, channel: LetterRecipient['channel'] = 'link'): LetterRecipient => ({
  guardianId,
  name: guardianId,
  relation: 'Mother',
  channel,
  why: null,
})
const copy = (guardianId: string, state: DeliveryState): Pick<DeliveryView, 'guardianId' | 'state'> => ({
  guardianId,
  state,
})
const without = (
  recipients: LetterRecipient[],
  deliveries: Pick<DeliveryView, 'guardianId' | 'state'>[],
): string[] => recipientsStillWithout({ recipients, deliveries }).map(({ guardianId }) => guardianId)

describe('recipientsStillWithout', () => {
  it.each<[DeliveryState, string[]]>([
    ['queued', []],
    ['sending', []],
    ['sent', []],
    ['opened', []],
    ['failed', ['mother']],
    ['cancelled', ['mother']],
  ])('counts a copy that is %s as %j still without', (state, left) => {
    expect(without([carer('mother')], [copy('mother', state)])).toEqual(left)
  })

  it('keeps the carer nobody wrote to, and leaves out whoever cannot be reached', () => {
    const family = [carer('mother'), carer('father'), carer('aunt', null)]
    expect(without(family, [copy('mother', 'opened')])).toEqual(['father'])
    expect(without(family, [])).toEqual(['mother', 'father'])
  })

  it('takes a second copy that arrived over a first that did not', () => {
    expect(without([carer('mother')], [copy('mother', 'failed'), copy('mother', 'sent')])).toEqual([])
  })
})
