import { describe, expect, it } from 'vitest'
import { topicsOfGoal } from '../../shared/goalTopics.ts'

// Activities as therapists put them (common practice, no source); the second column is what a reader would say they
// are about.
describe('topicsOfGoal', () => {
  it.each([
    ['Writes three lines of a story that the teacher can read', ['handwriting']],
    ['Keeps up with copying from the board in science', ['speed']],
    ['Writes for ten minutes without pain in the hand', ['handwriting', 'pain']],
    ['Cuts round a circle with left-handed scissors', ['scissors']],
    ['Cutting out shapes from card', ['scissors']],
    ['Cuts up dinner with knife and fork', []],
    ['Ties school shoes without help', ['dressing']],
    ['Does up the buttons of a coat', ['dressing']],
    ['Makes a sandwich in the kitchen', ['kitchen']],
    ['Opens a tin with a can opener', ['kitchen']],
    ['Types homework with both hands', ['computer']],
    ['Fastens a bicycle helmet before breakfast', []],
    ['Joins in at playtime', []],
  ])('%s → %j', (activity, topics) => {
    expect(topicsOfGoal(activity)).toEqual(topics)
  })
})
