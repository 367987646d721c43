import type { Request } from 'express'
import type { AnyObjectSchema, InferType } from 'yup'
import { defaultPageSize, maximumPageSize } from '../../shared/pages.ts'
import { ifMatchMissing, invalid } from '../errors.ts'

/**
 * Checks a body against its shared schema: types strictly (no '1' for 1), unknown keys refused, then the text tidied
 * the same way the form did. Throws yup's ValidationError (422).
 */
export const parseBody = async <S extends AnyObjectSchema>(
  schema: S,
  value: unknown,
): Promise<InferType<S>> => {
  await schema.validate(value ?? {}, { strict: true, abortEarly: false })
  return schema.cast(value) as InferType<S>
}

export const bodyOf = <S extends AnyObjectSchema>(req: Request, schema: S): Promise<InferType<S>> =>
  parseBody(schema, req.body)

/** The version a change was made from. */
export const ifMatchOf = (req: Request): number => {
  const match = /^"?(\d{1,9})"?$/.exec(req.get('If-Match') ?? '')
  if (!match) throw ifMatchMissing()
  return Number(match[1])
}

export const idempotencyKeyOf = (req: Request): string | null => {
  const key = req.get('Idempotency-Key')
  if (key === undefined) return null
  if (!/^[\w-]{8,64}$/.test(key)) throw invalid({ form: 'The request key is not valid. Reload the page.' })
  return key
}

/** One value of the query string; a repeated key counts once, its first value. */
export const queryText = (req: Request, name: string): string | null => {
  const value = req.query[name]
  const first = Array.isArray(value) ? value[0] : value
  return typeof first === 'string' && first.trim() !== '' ? first.trim().slice(0, 200) : null
}

/** A query value from a fixed list; anything else is a 422 that names it. */
export const queryChoice = <T extends string>(
  req: Request,
  name: string,
  allowed: readonly T[],
): T | null => {
  const value = queryText(req, name)
  if (value === null) return null
  const found = allowed.find((candidate) => candidate === value)
  if (!found) throw invalid({ [name]: `${name} must be one of: ${allowed.join(', ')}` })
  return found
}

export interface PageRequest {
  page: number
  size: number
  offset: number
}

const wholeNumber = (req: Request, name: string, fallback: number, max: number) => {
  const value = queryText(req, name)
  if (value === null) return fallback
  if (!/^\d{1,6}$/.test(value) || Number(value) < 1 || Number(value) > max)
    throw invalid({ [name]: `${name} must be 1 to ${max}` })
  return Number(value)
}

export const pageOf = (req: Request): PageRequest => {
  const page = wholeNumber(req, 'page', 1, 10_000)
  const size = wholeNumber(req, 'size', defaultPageSize, maximumPageSize)
  return { page, size, offset: (page - 1) * size }
}
