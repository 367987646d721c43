import { demoPassword } from './demoPasswords.ts'
import type { DemoPerson } from './demoTypes.ts'

/** Parents and carers with an account: one for each adult. All names are made up. */
const names = {
  luciaQuispe: 'Lucía Quispe',
  tomArnold: 'Tom Arnold',
  saskiaVerhaeghen: 'Saskia Verhaeghen',
  aminaBello: 'Amina Bello',
  faridHaidari: 'Farid Haidari',
  arohaWhetuira: 'Aroha Whetuira',
  grahamEllacott: 'Graham Ellacott',
  hudaAlRashwan: 'Huda Al-Rashwan',
  jessicaCoombes: 'Jessica Coombes',
  keikoTorigoe: 'Keiko Torigoe',
  kwameAdjarey: 'Kwame Adjarey',
  majaLindqvist: 'Maja Lindqvist',
  fatouDiallo: 'Fatou Diallo',
  piotrSroka: 'Piotr Sroka',
  meenaRaghunath: 'Meena Raghunath',
  islaStrathearn: 'Isla Strathearn',
  wenTsao: 'Wen Tsao',
  folakeBright: 'Folake Bright',
  rhodriProsser: 'Rhodri Prosser',
  hannaHalbersztadt: 'Hanna Halbersztadt',
  carmenMontoya: 'Carmen Montoya',
  noelaniKapaona: 'Noelani Kapaona',
  nadiaSiddiq: 'Nadia Siddiq',
  danielRowe: 'Daniel Rowe',
  judithAmory: 'Judith Amory',
  sevgiYavas: 'Sevgi Yavaş',
  graceMakori: 'Grace Makori',
  kirstyGarroway: 'Kirsty Garroway',
  andresSalvatierra: 'Andrés Salvatierra',
  elenaDanailova: 'Elena Danailova',
  hemiParangi: 'Hemi Parangi',
  ioanaGrigorescu: 'Ioana Grigorescu',
  bisiOyelaran: 'Bisi Oyelaran',
  clareHolloway: 'Clare Holloway',
  rachidBenkirat: 'Rachid Benkirat',
  anhBui: 'Anh Bui',
  ruthEdgecombe: 'Ruth Edgecombe',
  orlaTierney: 'Orla Tierney',
  selimKocabas: 'Selim Kocabaş',
  leratoMoloi: 'Lerato Moloi',
  conradAspinallReyes: 'Conrad Aspinall-Reyes',
} as const

export type ParentKey = keyof typeof names

// The twins' parents read one inbox between them. Saoirse's mother's address stopped taking mail.
const addresses: Partial<Record<ParentKey, string>> = {
  majaLindqvist: 'lindqvist-shaw.family@harrowmere.example',
  orlaTierney: 'orla.tierney@closed-mailbox.example',
}

const plainLetters = (name: string) =>
  name.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase().replaceAll(' ', '.')

const account = (key: ParentKey): DemoPerson<ParentKey> => ({
  key,
  displayName: names[key],
  email: addresses[key] ?? `${plainLetters(names[key])}@harrowmere.example`,
  password: demoPassword(key),
  roles: ['guardian'],
  newlyQualified: false,
  wte: null,
  workingHand: 'right',
})

export const parents: readonly DemoPerson<ParentKey>[] = (Object.keys(names) as ParentKey[]).map(account)

const byKey = new Map(parents.map((parent) => [parent.key, parent]))

/** The account of a parent. */
export function parentOf(key: ParentKey): DemoPerson<ParentKey> {
  const parent = byKey.get(key)
  if (!parent) throw new Error(`No parent ${key}`)
  return parent
}
