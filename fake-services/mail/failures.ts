export const failureKinds = ['refuse', 421, 450, 451, 550, 'slow', 'cutBeforeDot', 'cutAfterDot'] as const

/**
 * What goes wrong at the wire.
 * - `refuse`: the connection is dropped before the greeting;
 * - 450, 550: the recipient is turned down with this reply;
 * - 421, 451: the message is turned down with this reply after its final dot;
 * - `slow`: the reply to the final dot comes after two seconds, the message is kept;
 * - `cutBeforeDot`: the connection is cut in the middle of the message, which is lost;
 * - `cutAfterDot`: the message is kept, and the connection cut before the reply.
 */
export type FailureKind = (typeof failureKinds)[number]

export type Failure = {
  kind: FailureKind
  /** How many times it happens before mail flows again. */
  count: number
  /** Only mail to this address fails. `refuse` comes before any address is known and cannot be limited so. */
  address: string | null
}

/** Reads the body of POST /api/next-failure; a text says what is wrong with it. */
export function readFailure(body: unknown): Failure | string {
  if (typeof body !== 'object' || body === null) return 'Send a JSON object.'
  const { kind, count = 1, address = null } = body as Record<string, unknown>
  const known = failureKinds.find((each) => each === kind)
  if (known === undefined) return `kind must be one of ${failureKinds.join(', ')}.`
  if (typeof count !== 'number' || !Number.isInteger(count) || count < 0 || count > 1000) {
    return 'count must be a whole number from 0 to 1000 (0 clears what was planned).'
  }
  if (address !== null && (typeof address !== 'string' || address === ''))
    return 'address must be an e-mail address.'
  if (address !== null && known === 'refuse')
    return 'refuse comes before any address is known; leave address out.'
  return { kind: known, count, address }
}

/** The failures still to happen, in the order they were asked for. */
export class FailurePlan {
  #planned: Failure[] = []

  /** Count 0 clears the plan. */
  add(failure: Failure): void {
    if (failure.count === 0) this.#planned = []
    else this.#planned.push({ ...failure })
  }

  /** Uses up one failure of these kinds that applies to these recipients; null when mail should flow. */
  take(kinds: FailureKind[], recipients: string[]): FailureKind | null {
    const applies = ({ kind, address }: Failure) =>
      kinds.includes(kind) &&
      (address === null || recipients.some((each) => each.toLowerCase() === address.toLowerCase()))
    const failure = this.#planned.find(applies)
    if (failure === undefined) return null
    failure.count -= 1
    if (failure.count === 0) this.#planned = this.#planned.filter((each) => each !== failure)
    return failure.kind
  }
}
