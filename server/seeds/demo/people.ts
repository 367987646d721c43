import type { Role } from '../../../shared/roles.ts'
import { demoPassword } from './demoPasswords.ts'
import type { DemoPerson } from './demoTypes.ts'

export type StaffKey = 'ines' | 'adaeze' | 'tomasz' | 'mairi' | 'rohan' | 'pauline'
export type TeacherKey = 'siobhan' | 'kwabena' | 'hyejin'

const person = <Key extends StaffKey | TeacherKey>(
  key: Key,
  displayName: string,
  email: string,
  roles: Role[],
  rest: Partial<Pick<DemoPerson, 'newlyQualified' | 'wte' | 'workingHand'>> = {},
): DemoPerson<Key> => ({
  key,
  displayName,
  email,
  password: demoPassword(key),
  roles,
  newlyQualified: false,
  wte: null,
  workingHand: 'left',
  ...rest,
})

export const staff: readonly DemoPerson<StaffKey>[] = [
  person('ines', 'Ines Valderrama', 'ines.valderrama@oldtannery.example', ['clinicLead'], { wte: 1 }),
  person('adaeze', 'Adaeze Nwosu-Reid', 'adaeze.nwosu-reid@oldtannery.example', ['therapist'], { wte: 1 }),
  person('tomasz', 'Tomasz Zielak', 'tomasz.zielak@oldtannery.example', ['therapist'], {
    wte: 1,
    workingHand: 'right',
  }),
  person('mairi', 'Mairi Carnathy', 'mairi.carnathy@oldtannery.example', ['therapist'], { wte: 0.6 }),
  person('rohan', 'Rohan Venkadesh', 'rohan.venkadesh@oldtannery.example', ['therapist'], {
    wte: 0.8,
    newlyQualified: true,
    workingHand: 'right',
  }),
  person('pauline', 'Pauline Osterby', 'pauline.osterby@oldtannery.example', ['administrator'], {
    wte: 1,
    workingHand: 'right',
  }),
]

export const teachers: readonly DemoPerson<TeacherKey>[] = [
  person('siobhan', 'Siobhán Delahunt', 'siobhan.delahunt@larkwater.example', ['teacher'], {
    workingHand: 'right',
  }),
  person('kwabena', 'Kwabena Asirifi', 'kwabena.asirifi@thistlebank.example', ['teacher'], {
    workingHand: 'right',
  }),
  person('hyejin', 'Hye-jin Noh', 'hye-jin.noh@brindlemoor.example', ['teacher']),
]
