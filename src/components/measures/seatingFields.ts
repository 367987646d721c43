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
  hint?: string
}

/** Lengths in cm, in the order a tape goes round the child. */
export const seatingGroups: { words: string; fields: SeatingField[] }[] = [
  {
    words: 'The child',
    fields: [
      { name: 'poplitealCm', label: 'Floor to hollow of the knee', hint: 'Feet flat. 22 to 55 as a rule.' },
      { name: 'shoeCm', label: 'Added for the shoe', hint: '2 to 3. Leave empty if measured in shoes.' },
      { name: 'buttockPoplitealCm', label: 'Buttock to hollow of the knee' },
      {
        name: 'elbowHeightCm',
        label: 'Elbow above the seat',
        hint: 'Bent, shoulder loose. 10 to 32 as a rule.',
      },
      { name: 'shoulderHeightCm', label: 'Shoulder above the seat' },
      { name: 'statureCm', label: 'Stature', hint: 'Used only where the knee was not measured.' },
    ],
  },
  {
    words: 'Seat and desk',
    fields: [
      { name: 'seatHeightCm', label: 'Seat from the floor', hint: 'At its front edge.' },
      { name: 'seatDepthCm', label: 'Depth of the seat' },
      { name: 'deskHeightCm', label: 'Desk from the floor' },
      { name: 'leftClearanceCm', label: 'Free space on the left' },
    ],
  },
]

export const seatingLabels = Object.fromEntries(
  seatingGroups.flatMap(({ fields }) => fields.map(({ name, label }) => [name, label])),
) as Record<Lengths, string>
