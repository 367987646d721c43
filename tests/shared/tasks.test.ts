import { describe, expect, it } from 'vitest'
import { dueLevel, reviewLevel } from '../../shared/tasks.ts'

// Levels and thresholds are this clinic's own rules; no source.
describe('how pressing a task is', () => {
  it.each([
    ['2026-11-30', 'overdue'],
    ['2026-12-01', 'due'],
    ['2026-12-02', 'soon'],
    ['2024-02-29', 'overdue'],
    [null, 'soon'],
  ])('due on %s is %s on 1 Dec 2026', (dueOn, level) => {
    expect(dueLevel(dueOn, '2026-12-01')).toBe(level)
  })
})

describe('how pressing a review is', () => {
  it.each([
    ['2026-12-16', null],
    ['2026-12-15', 'soon'],
    ['2026-12-02', 'soon'],
    ['2026-12-01', 'due'],
    ['2026-11-30', 'overdue'],
    [null, null],
  ])('on %s is %s on 1 Dec 2026', (nextReviewOn, level) => {
    expect(reviewLevel(nextReviewOn, '2026-12-01')).toBe(level)
  })
})
