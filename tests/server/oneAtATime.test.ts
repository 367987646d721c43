import { describe, expect, it } from 'vitest'
import { AppError } from '../../server/errors.ts'
import { oneAtATime } from '../../server/uploads/oneAtATime.ts'

/** A piece of work that ends when it is told to. */
const work = () => {
  let finish: () => void = () => undefined
  const finished = new Promise<void>((resolve) => (finish = resolve))
  return { finish, run: () => finished }
}

describe('opening uploads', () => {
  it('never overlaps, keeps its order, and goes on after one fails', async () => {
    let running = 0
    const order: number[] = []
    const all = [1, 2, 3, 4].map((number) =>
      oneAtATime(async () => {
        running += 1
        expect(running).toBe(1)
        await new Promise((resolve) => setImmediate(resolve))
        order.push(number)
        running -= 1
        if (number === 2) throw new Error('damaged')
      }),
    )
    const outcomes = await Promise.allSettled(all)
    expect(order).toEqual([1, 2, 3, 4])
    expect(outcomes.map((outcome) => outcome.status)).toEqual([
      'fulfilled',
      'rejected',
      'fulfilled',
      'fulfilled',
    ])
  })

  it('asks the ninth at a time to come back, and takes it once there is room', async () => {
    const eight = Array.from({ length: 8 }, work)
    const running = eight.map(({ run }) => oneAtATime(run))
    const refused = await oneAtATime(async () => 'ninth').catch((error: unknown) => error)
    expect(refused).toBeInstanceOf(AppError)
    expect(refused).toMatchObject({ status: 429, code: 'slow_down' })
    eight.forEach(({ finish }) => finish())
    await Promise.all(running)
    expect(await oneAtATime(async () => 'later')).toBe('later')
  })
})
