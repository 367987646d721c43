import type { DemoAlert } from './demoTypes.ts'

/** Red flags and who did what about them. Those that a referral raises stand in its words (shared/referralFlags.ts). */
export const alerts: readonly DemoAlert[] = [
  {
    child: 8,
    flag: 'preference_before_12_months',
    fromReferral: true,
    level: 'overdue',
    text: 'Left hand only since about 8 months of age.',
    raised: { day: -38, time: '09:32' },
    acted: {
      day: -37,
      time: '12:40',
      by: 'tomasz',
      action:
        'Rang the mother and the family doctor. Referral to the child development service sent the same day. No therapy block booked.',
    },
  },
  {
    child: 8,
    flag: 'other_hand_little_used',
    fromReferral: true,
    level: 'overdue',
    text: 'Right hand often fisted and seldom used to hold things.',
    raised: { day: -38, time: '09:32' },
    acted: {
      day: -37,
      time: '12:40',
      by: 'tomasz',
      action: 'Part of the same referral to the child development service.',
    },
  },
  {
    child: 3,
    flag: 'pain',
    fromReferral: true,
    level: 'due',
    text: 'Hand hurts after about ten minutes of writing.',
    raised: { day: -127, time: '09:32' },
    acted: {
      day: -98,
      time: '15:10',
      by: 'rohan',
      action:
        'Measured: 4 of 10 after ten minutes. Pauses agreed with school, no extra practice, letter to the family doctor. Talked over with Ines Valderrama.',
    },
  },
  {
    child: 13,
    flag: 'pressure_to_switch',
    fromReferral: true,
    level: 'due',
    text: 'Grandmother asks school to give the pencil in the right hand.',
    raised: { day: -106, time: '09:32' },
    acted: {
      day: -80,
      time: '12:00',
      by: 'adaeze',
      action:
        'Talked with mother and grandmother. Asked directly: no punishment at home or school. Advice on speaking well of the left hand given.',
    },
  },
  {
    child: 15,
    flag: 'pressure_to_switch',
    fromReferral: true,
    level: 'due',
    text: 'Was asked at five to write with the right hand.',
    raised: { day: -135, time: '09:32' },
    acted: {
      day: -104,
      time: '11:00',
      by: 'tomasz',
      action:
        'Heard from mother and child; it ended with the change of school. Both hands left free since then.',
    },
  },
  {
    child: 15,
    flag: 'change_of_hand',
    fromReferral: true,
    level: 'due',
    text: 'Now writes with the right hand.',
    raised: { day: -135, time: '09:32' },
    acted: {
      day: -104,
      time: '11:00',
      by: 'tomasz',
      action:
        'The change was asked for by an adult; no illness or injury, no new weakness. Both hands left free since then.',
    },
  },
  {
    child: 20,
    flag: 'swaps_from_six',
    fromReferral: true,
    level: 'soon',
    text: 'Six years old and different hands for different jobs.',
    raised: { day: -205, time: '09:32' },
    acted: {
      day: -170,
      time: '12:10',
      by: 'tomasz',
      action: 'Assessed: steady by task, which is fine.',
    },
  },
  {
    child: 31,
    flag: 'swaps_from_six',
    fromReferral: true,
    level: 'soon',
    text: 'Ten years old and uses either hand for most jobs.',
    raised: { day: -66, time: '09:32' },
    acted: {
      day: -30,
      time: '15:30',
      by: 'adaeze',
      action: 'Assessed: steady by task when watched. Second visit to conclude.',
    },
  },
  {
    child: 33,
    flag: 'new_weakness',
    fromReferral: true,
    level: 'overdue',
    text: 'Weakness of the right side.',
    raised: { day: -405, time: '09:32' },
    acted: {
      day: -405,
      time: '10:05',
      by: 'ines',
      action:
        'Rang the paediatrician: long-standing, known since birth and followed there. No recent change.',
    },
  },
  {
    child: 37,
    flag: 'pain',
    fromReferral: true,
    level: 'due',
    text: 'Hand and forearm sore after ten minutes of writing.',
    raised: { day: -107, time: '09:32' },
    acted: {
      day: -78,
      time: '15:00',
      by: 'rohan',
      action:
        'Measured: 6 of 10. No long writing until the family doctor has seen her; letter sent with consent. Pauses and typing agreed with school.',
    },
  },
  {
    child: 27,
    flag: 'change_of_hand',
    fromReferral: false,
    level: 'due',
    text: 'Left forearm broken and in plaster: writes with the right hand for six weeks.',
    raised: { day: -48, time: '12:35' },
    acted: {
      day: -48,
      time: '13:05',
      by: 'adaeze',
      action:
        'Medical review with the fracture clinic’s letter asked for. Block stopped, school told, way back planned for after the plaster.',
    },
  },
  {
    child: 39,
    flag: 'new_weakness',
    fromReferral: true,
    level: 'overdue',
    text: 'New weakness of the left hand with headaches for about a week.',
    raised: { day: -27, time: '09:32' },
    acted: {
      day: -27,
      time: '09:50',
      by: 'ines',
      action:
        'Rang the mother at once: emergency department this morning, she is on her way. Rang the hospital’s children’s team ahead. School told whom to call if anything changes.',
    },
  },
  {
    child: 39,
    flag: 'change_of_hand',
    fromReferral: true,
    level: 'due',
    text: 'Has always been left-handed and now writes with the right hand.',
    raised: { day: -27, time: '09:32' },
    acted: {
      day: -27,
      time: '09:50',
      by: 'ines',
      action: 'Part of the same call. Therapy begins only when the hospital agrees.',
    },
  },
]
