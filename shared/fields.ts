import { array, object, string, type AnyObject, type ObjectShape } from 'yup'

// Control characters other than tab and line feed, NUL included, never belong in clinic text.
// eslint-disable-next-line no-control-regex -- these very characters are what is refused
const forbiddenCharacters = /[\u0000-\u0008\u000b-\u001f\u007f]/
const loneSurrogate = /[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/

/** Line endings become LF and outer white space goes; applied by `cast` after strict validation. */
export const tidy = (value: unknown) =>
  typeof value === 'string' ? value.replace(/\r\n?/g, '\n').trim() : value

/** No control characters and no half characters, which could not be kept as they were typed. */
export const isClean = (value: string | null | undefined) => {
  if (value === null || value === undefined) return true
  const tidied = String(tidy(value))
  return !forbiddenCharacters.test(tidied) && !loneSurrogate.test(tidied)
}

const lengthOf = (value: string) => [...String(tidy(value))].length

interface TextLimits {
  max: number
  min?: number
}

const limitedText = (label: string, { min = 0, max }: TextLimits) =>
  string()
    .transform(tidy)
    .test('clean', `${label} contains characters that cannot be kept`, isClean)
    .test('max', `${label} can be at most ${max} characters`, (value) => !value || lengthOf(value) <= max)
    .test('min', `${label} needs at least ${min} characters`, (value) => !value || lengthOf(value) >= min)

/** A text that must be given. Lengths count characters after outer white space is removed. */
export const text = (label: string, limits: TextLimits) =>
  limitedText(label, limits)
    .required(`Enter ${label.toLowerCase()}`)
    .test('filled', `Enter ${label.toLowerCase()}`, (value) => lengthOf(value) > 0)

/** A text that may be missing. Absence is null, never the empty string. */
export const optionalText = (label: string, limits: TextLimits) =>
  limitedText(label, limits)
    .transform((value: unknown) => (value === '' ? null : value))
    .nullable()
    .defined()

const idPattern = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/

/** Is this text an id as the database makes them? */
export const isId = (value: string): boolean => idPattern.test(value)

export const id = (label = 'This') =>
  string().required(`${label} is missing`).matches(idPattern, `${label} is not a valid reference`)

export const optionalId = (label = 'This') =>
  string()
    .nullable()
    .defined()
    .matches(idPattern, {
      message: `${label} is not a valid reference`,
      excludeEmptyString: false,
    })

/**
 * One mailbox and nothing else: no list, no display name, no line break, no quoting tricks.
 * Narrower than RFC 5321 on purpose, so that what is accepted reaches exactly one recipient.
 */
export const isOneMailbox = (value: string) =>
  value.length <= 254 &&
  /^[a-z0-9._%+-]{1,64}@(?:[a-z0-9](?:[a-z0-9-]{0,61}[a-z0-9])?\.)+[a-z]{2,24}$/i.test(value) &&
  !value.includes('..') &&
  !value.startsWith('.') &&
  !value.includes('.@')

const mailbox = (label: string) =>
  string()
    .transform((value: unknown) =>
      typeof value === 'string' ? value.replace(/^[ \t]+|[ \t]+$/g, '') : value,
    )
    .test('mailbox', `${label} must be one e-mail address, like name@example.org`, (value) => {
      if (value === null || value === undefined || value === '') return true
      return isOneMailbox(value.replace(/^[ \t]+|[ \t]+$/g, ''))
    })

export const email = (label = 'E-mail address') => mailbox(label).required(`Enter ${label.toLowerCase()}`)

export const optionalEmail = (label = 'E-mail address') =>
  mailbox(label)
    .transform((value: unknown) => (value === '' ? null : value))
    .nullable()
    .defined()

export const optionalPhone = (label = 'Phone') =>
  optionalText(label, { max: 30 }).matches(/^[0-9 +()/-]{5,30}$/, {
    message: `${label} can hold digits, spaces and + ( ) - /`,
    excludeEmptyString: true,
  })

export const choice = <T extends string>(label: string, values: readonly T[]) =>
  string<T>()
    .required(`Choose ${label.toLowerCase()}`)
    .oneOf(values as T[], `Choose ${label.toLowerCase()} from the list`)

export const optionalChoice = <T extends string>(label: string, values: readonly T[]) =>
  string<T>()
    .nullable()
    .defined()
    .oneOf([...values, null] as (T | null)[] as T[], `Choose ${label.toLowerCase()} from the list`)

export const choices = <T extends string>(label: string, values: readonly T[]) =>
  array(
    string<T>()
      .required()
      .oneOf(values as T[], `Choose ${label.toLowerCase()} from the list`),
  )
    .required(`Choose ${label.toLowerCase()}`)
    .max(values.length, `Choose ${label.toLowerCase()} from the list`)

/** A request body: known keys only. Servers validate it with `strict`, then `cast` to tidy the text. */
export const body = <S extends ObjectShape>(shape: S) =>
  object<AnyObject, S>(shape).noUnknown('This form sent a field that is not known: ${unknown}')

/** The body of a request that asks for an act and says no more. */
export const emptySchema = body({})
