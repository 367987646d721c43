import type { Socket } from 'node:net'
import { buffer } from 'node:stream/consumers'
import { setTimeout as wait } from 'node:timers/promises'
import { SMTPServer } from 'smtp-server'
import type { FailurePlan } from './failures.ts'
import { readMessage, type MessageStore } from './messages.ts'

const slowMilliseconds = 2_000

const reply = (code: number) =>
  Object.assign(new Error(code < 500 ? 'Try again later' : 'Not accepted here'), { responseCode: code })

/** The SMTP side: takes every message into the store, except where the plan says otherwise. */
export function createSmtpServer(store: MessageStore, plan: FailurePlan): SMTPServer {
  const sockets = new Map<number, Socket>()
  const cut = (session: { remotePort: number }) => sockets.get(session.remotePort)?.destroy()

  const smtp = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    disableReverseLookup: true,
    logger: false,
    size: 40 * 1024 * 1024,

    onRcptTo({ address }, _session, done) {
      const failure = plan.take([450, 550], [address])
      return done(typeof failure === 'number' ? reply(failure) : null)
    },

    onData(stream, session, done) {
      const to = session.envelope.rcptTo.map(({ address }) => address)
      const from = session.envelope.mailFrom === false ? '' : session.envelope.mailFrom.address
      const failure = plan.take([421, 451, 'slow', 'cutBeforeDot', 'cutAfterDot'], to)
      if (failure === 'cutBeforeDot') {
        stream.once('data', () => cut(session))
        stream.on('error', () => undefined)
        return
      }
      const accept = async () => {
        const raw = await buffer(stream)
        if (stream.sizeExceeded) throw reply(552)
        if (typeof failure === 'number') throw reply(failure)
        store.add(await readMessage(raw, from, to))
        if (failure === 'slow') await wait(slowMilliseconds)
        if (failure === 'cutAfterDot') cut(session)
      }
      accept().then(() => done(), done)
    },
  })

  smtp.server.on('connection', (socket: Socket) => {
    if (plan.take(['refuse'], []) !== null) return socket.destroy()
    const { remotePort } = socket
    if (remotePort === undefined) return
    sockets.set(remotePort, socket)
    socket.once('close', () => sockets.delete(remotePort))
  })
  // A client that goes away in the middle is the client's affair; without a listener it would end this process.
  smtp.on('error', () => undefined)
  return smtp
}
