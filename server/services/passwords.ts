import { hash, verify } from '@node-rs/argon2'
import { dictionary } from '@zxcvbn-ts/language-common'
import { invalid } from '../errors.ts'
import { createLine } from '../inLine.ts'

/** argon2id with 19 MiB, two passes, one lane (OWASP password storage guidance, as asked in the security bar). */
const cost = { memoryCost: 19_456, timeCost: 2, parallelism: 1 }
/** Hashing is heavy on purpose. */
const inTurn = createLine({ atOnce: 2, mostWaiting: 50, retryAfterSeconds: 5 })

/** The only change made to a password: NFKC, so that é typed on two systems is the same letter. */
const canonical = (password: string) => password.normalize('NFKC')

export const hashPassword = (password: string): Promise<string> =>
  inTurn(() => hash(canonical(password), cost))

// Equal work for unknown addresses: the answer's timing must not tell whether an account exists.
let dummyHash: Promise<string> | null = null

export const verifyPassword = async (stored: string | null, password: string): Promise<boolean> => {
  dummyHash ??= hash('no account has this password', cost)
  const against = stored ?? (await dummyHash)
  const matches = await inTurn(() => verify(against, canonical(password)))
  return matches && stored !== null
}

/** True when a stored hash was made with weaker settings than today's. */
export const needsRehash = (stored: string): boolean => {
  const [, m, t] = /^\$argon2id\$v=19\$m=(\d+),t=(\d+),p=\d+\$/.exec(stored) ?? []
  return m === undefined || Number(m) < cost.memoryCost || Number(t) < cost.timeCost
}

const common = new Set<string>(
  dictionary['passwords-common'].filter((word): word is string => typeof word === 'string'),
)
const ownWords = [
  'fanflower',
  'therapist',
  'clinicleader',
  'cliniclead',
  'administrator',
  'guardian',
  'teacher',
  'clinic',
  'password',
  'lefthand',
]

/** The shortest text whose repetition gives the whole, e.g. 'abcabcab' → 'abc'. */
const unitOf = (text: string): string => {
  for (let length = 1; length <= text.length / 2; length += 1) {
    const unit = text.slice(0, length)
    if (unit.repeat(Math.ceil(text.length / length)).slice(0, text.length) === text) return unit
  }
  return text
}

const rows = ['1234567890', 'abcdefghijklmnopqrstuvwxyz', 'qwertyuiopasdfghjklzxcvbnm']
  .map((row) => row.repeat(13))
  .flatMap((row) => [row, [...row].reverse().join('')])

/** A walk along the digits, the alphabet or the keyboard, in either direction. */
const isRun = (text: string) => rows.some((row) => row.includes(text))

/**
 * Why a password that is long enough is still easy to guess, in words; null when nothing is known against it.
 * Known: a list of about 49 000 common passwords (also repeated, or with digits and signs around them), one short
 * piece repeated, runs such as 123456…, and this product's and the person's own words.
 */
export const weakness = (password: string, personal: readonly string[]): string | null => {
  const lower = canonical(password).toLowerCase()
  const core = lower.replace(/^[^\p{L}]+|[^\p{L}]+$/gu, '')
  const letters = lower.replace(/[^\p{L}\p{N}]/gu, '')
  for (const form of [lower, core, letters]) {
    if (form !== '' && (common.has(form) || common.has(unitOf(form))))
      return 'This password is on a list of common passwords. Use several unrelated words.'
  }
  if (unitOf(letters).length < 8 && letters.length > 0)
    return 'This password repeats one short piece. Use several unrelated words.'
  if (isRun(letters)) return 'This password is one long run of keys. Use several unrelated words.'
  const words = [
    ...ownWords,
    ...personal.flatMap((part) =>
      part
        .toLowerCase()
        .normalize('NFKC')
        .split(/[^\p{L}]+/u),
    ),
  ]
    .filter((word) => word.length >= 4)
    .sort((a, b) => b.length - a.length)
  const rest = words.reduce((left, word) => left.replaceAll(word, ''), letters)
  if (rest !== letters && rest.replace(/\p{N}/gu, '').length < 6)
    return 'This password is made of words anybody could connect with you or Fanflower. Use several unrelated words.'
  return null
}

/** Throws 422 beside the field when the password is easy to guess. `personal`: the person's name, address, clinic. */
export const assertStrongPassword = (
  password: string,
  personal: readonly string[],
  field = 'newPassword',
): void => {
  const problem = weakness(password, personal)
  if (problem) throw invalid({ [field]: problem })
}
