import { describe, expect, it } from 'vitest'
import { inWords, mergeChanges } from '@/composables/differences.ts'

const opened = { phone: '140', weeks: 12, concerns: ['handwriting'], note: null as string | null }

describe('changes of two people to the same values', () => {
  it('keeps both when they changed different fields', () => {
    const { merged, clashes } = mergeChanges(opened, { ...opened, weeks: 13 }, { ...opened, phone: '141' })
    expect(merged).toEqual({ ...opened, weeks: 13, phone: '141' })
    expect(clashes).toEqual([])
  })

  it('names the field both changed differently and keeps mine there until somebody chooses', () => {
    const { merged, clashes } = mergeChanges(opened, { ...opened, weeks: 13 }, { ...opened, weeks: 14 })
    expect(clashes).toEqual(['weeks'])
    expect(merged.weeks).toBe(13)
  })

  it('sees no clash when both made the same change', () => {
    const both = { ...opened, concerns: ['handwriting', 'speed'] }
    expect(mergeChanges(opened, both, { ...both, concerns: [...both.concerns] }).clashes).toEqual([])
  })

  it('takes a list and an emptied field as changes like any other', () => {
    const withNote = { ...opened, note: 'Call first' }
    const { merged, clashes } = mergeChanges(
      withNote,
      { ...withNote, note: null },
      { ...withNote, concerns: ['handwriting', 'seating'] },
    )
    expect(merged).toEqual({ ...withNote, note: null, concerns: ['handwriting', 'seating'] })
    expect(clashes).toEqual([])
  })

  it('says absence and yes or no in words', () => {
    expect(inWords(['note'], { note: null }, { note: 'Call' }, { note: 'Note' })).toEqual([
      { label: 'Note', mine: 'empty', theirs: 'Call' },
    ])
    expect(inWords(['safe'], { safe: true }, { safe: false }, {})[0]).toEqual({
      label: 'safe',
      mine: 'yes',
      theirs: 'no',
    })
  })
})
