import express from 'express'
import request from 'supertest'
import { describe, expect, it } from 'vitest'
import { AppError } from '../../server/errors.ts'
import { errorHandler } from '../../server/middleware/errorHandler.ts'
import { createLine } from '../../server/inLine.ts'

const rules = { atOnce: 1, mostWaiting: 7, retryAfterSeconds: 5 }

/** A piece of work that ends when it is told to. */
const work = () => {
  let finish: () => void = () => undefined
  const finished = new Promise<void>((resolve) => (finish = resolve))
  return { finish, run: () => finished }
}

describe('work in line', () => {
  it.each([1, 2, 3])(
    'runs %i at once at most, keeps its order, and goes on after one fails',
    async (atOnce) => {
      const inLine = createLine({ ...rules, atOnce })
      let running = 0
      let most = 0
      const begun: number[] = []
      const outcomes = await Promise.allSettled(
        [1, 2, 3, 4, 5].map((number) =>
          inLine(async () => {
            running += 1
            most = Math.max(most, running)
            begun.push(number)
            await new Promise((resolve) => setImmediate(resolve))
            running -= 1
            if (number === 2) throw new Error('damaged')
            return number
          }),
        ),
      )
      expect(most).toBe(atOnce)
      expect(begun).toEqual([1, 2, 3, 4, 5])
      expect(outcomes.map((outcome) => outcome.status)).toEqual([
        'fulfilled',
        'rejected',
        'fulfilled',
        'fulfilled',
        'fulfilled',
      ])
    },
  )

  it('goes on after work that throws before it begins', async () => {
    const inLine = createLine(rules)
    const thrown = inLine(() => {
      throw new Error('at once')
    })
    await expect(thrown).rejects.toThrow('at once')
    expect(await inLine(async () => 'later')).toBe('later')
  })

  it('is refused when the line is full, and taken once there is room', async () => {
    const inLine = createLine(rules)
    const eight = Array.from({ length: 8 }, work)
    const running = eight.map(({ run }) => inLine(run))
    const refused = await inLine(async () => 'ninth').catch((error: unknown) => error)
    expect(refused).toBeInstanceOf(AppError)
    expect(refused).toMatchObject({ status: 503, code: 'busy' })
    eight.forEach(({ finish }) => finish())
    await Promise.all(running)
    expect(await inLine(async () => 'later')).toBe('later')
  })

  it('answers 503 with a time to come back over HTTP, in words, when the line is full', async () => {
    const inLine = createLine({ ...rules, mostWaiting: 0 })
    const first = work()
    const running = inLine(first.run)
    const app = express()
    app.use((req, _res, next) => {
      req.actor = { viewer: null, requestId: 'test', audited: false }
      next()
    })
    app.get('/', async (_req, res) => {
      await inLine(async () => undefined)
      res.json({})
    })
    app.use(errorHandler)
    const refused = await request(app).get('/')
    expect([refused.status, refused.headers['retry-after']]).toEqual([503, '5'])
    expect(refused.body).toMatchObject({ code: 'busy', message: expect.stringContaining('5 seconds') })
    first.finish()
    await running
    expect((await request(app).get('/')).status).toBe(200)
  })
})
