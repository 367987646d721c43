import type { SeatingDetails } from '@shared/measures.ts'

type Lengths = Exclude<
  {
    [Name in keyof SeatingDetails]: number | null extends SeatingDetails[Name] ? Name : never
  }[keyof SeatingDetails],
  'feetFlat' | 'neighbourHand' | 'lightSide'
>

export interface SeatingField {
  name: Lengths
  label: string
  hint: string
}

/** Lengths in cm, in the order a tape goes round the child. */
export const seatingGroups: { words: string; fields: SeatingField[] }[] = [
  {
    words: 'The child',
    fields: [
      { name: 'poplitealCm', label: 'Floor to hollow of the knee', hint: 'Feet flat.' },
      { name: 'shoeCm', label: 'Added for the shoe', hint: '2 to 3; empty if in shoes.' },
      { name: 'buttockPoplitealCm', label: 'Buttock to hollow of the knee', hint: 'Sitting right back.' },
      { name: 'elbowHeightCm', label: 'Elbow above the seat', hint: 'Bent, shoulder loose.' },
      { name: 'shoulderHeightCm', label: 'Shoulder above the seat', hint: 'Its top, sitting up.' },
      { name: 'statureCm', label: 'Stature', hint: 'If the knee is not measured.' },
    ],
  },
  {
    words: 'Seat and desk',
    fields: [
      { name: 'seatHeightCm', label: 'Seat from the floor', hint: 'At its front edge.' },
      { name: 'seatDepthCm', label: 'Depth of the seat', hint: 'Front edge to backrest.' },
      { name: 'deskHeightCm', label: 'Desk from the floor', hint: 'At its front edge.' },
      { name: 'leftClearanceCm', label: 'Free space on the left', hint: 'To the neighbour or a wall.' },
    ],
  },
]

export const seatingLabels = Object.fromEntries(
  seatingGroups.flatMap(({ fields }) => fields.map(({ name, label }) => [name, label])),
) as Record<Lengths, string>
