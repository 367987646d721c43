import { describe, expect, it } from 'vitest'
import { asksToSwitchHand } from '../../shared/handSwitching.ts'

// Switching a child's hand is not advised: Marcori et al. 2019 and Sattler's basic rules, as the clinic's policy has it.
describe('asksToSwitchHand', () => {
  it.each([
    'Amara will switch to the right hand for writing',
    'Switches to using her right hand',
    'Changes his writing over to the other hand',
    'Move the pencil to the right hand',
    'moving the pen into his other hand',
    'Swap to right-handed writing',
    'become right-handed',
    'Learns to be right-handed',
    'Uses the right hand instead of the left',
    'Uses the right hand rather than the left hand for drawing',
    'Stops using the left hand',
    'less use of her left hand',
    'Retrain the hand',
    'We will correct his handedness',
    'Convert the writing hand',
    'TURN TO THE OTHER HAND',
    'Switch Amara to the right hand',
    'Correct Amara’s handedness',
    'Transfer him over to writing with his right hand',
  ])('refuses "%s" whatever hand the child writes with', (text) => {
    expect(asksToSwitchHand(text)).toBe(true)
  })

  it.each([
    'Writes three lines with the right hand',
    'Holds the pencil in the right hand',
    'Uses his right hand for writing',
    'Draws a person with her right hand',
  ])('refuses "%s" for a child who writes with the left, not for one who writes with the right', (text) => {
    expect(asksToSwitchHand(text, 'left')).toBe(true)
    expect(asksToSwitchHand(text, 'right')).toBe(false)
    expect(asksToSwitchHand(text, null)).toBe(false)
  })

  it.each([
    'The right hand steadies the page while the left hand writes',
    'Writes five lines and keeps the paper still with the right hand',
    'Cuts out a circle with left-handed scissors, right hand turning the paper',
    'Finishes a drawing with the hand that started it',
    'Colours a picture without swapping hands',
    'Changes seats with the neighbour on the right-hand side',
    'Switches the computer mouse on',
    'Moves to the next line on time',
    'Turns to the right page',
    'Writes the correct answer in the box',
    'Moves her writing over to the right-hand side of the desk',
    'Passes and moves the ball to the other hand',
    'Moves a bean bag to the other hand and back',
    'Learns the correct hand position for the scissors',
    'Changes into PE clothes in five minutes',
    'Ties laces, the left hand leading and the right hand helping',
  ])('lets "%s" stand', (text) => {
    expect(asksToSwitchHand(text)).toBe(false)
    expect(asksToSwitchHand(text, 'left')).toBe(false)
  })
})
