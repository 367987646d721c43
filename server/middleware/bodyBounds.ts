import type { RequestHandler } from 'express'
import { AppError } from '../errors.ts'

/** Bounds of a body beside its size: no page of ours sends a tenth of it. */
const deepest = 20
const mostMembers = 1000

const tooMuch = () => new AppError(413, 'too_large', 'This is more than can be saved at once.')

/**
 * Refuses (413) content nested deeper or made of more members than any form of ours. What checks a body names the value
 * it turns down, and so walks it by recursion: a nest of thousands would end in a fault of ours.
 */
export const checkBounds = (content: unknown): void => {
  let level: unknown[] = [content]
  let members = 0
  for (let depth = 0; level.length > 0; depth += 1) {
    const next: unknown[] = []
    for (const part of level) {
      if (typeof part !== 'object' || part === null) continue
      if (depth >= deepest) throw tooMuch()
      const inside = Object.values(part)
      members += inside.length
      if (members > mostMembers) throw tooMuch()
      next.push(...inside)
    }
    level = next
  }
}

/** Behind the parser, before anything reads the body. */
export const boundedBody: RequestHandler = (req, _res, next) => {
  checkBounds(req.body)
  next()
}
