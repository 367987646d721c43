import { once } from 'node:events'
import type { AddressInfo, Server } from 'node:net'
import { FailurePlan } from './failures.ts'
import { createInboxServer } from './inbox.ts'
import { MessageStore } from './messages.ts'
import { createSmtpServer } from './smtp.ts'

export type MailFake = { smtpUrl: string; inboxUrl: string; stop: () => Promise<void> }

/**
 * Starts the mail fake on loopback; port 0 takes any free one. Rejects with the system's error (EADDRINUSE) when a
 * port is taken.
 */
export async function startMailFake(ports: { smtp: number; inbox: number }): Promise<MailFake> {
  const store = new MessageStore()
  const plan = new FailurePlan()
  const inbox = createInboxServer(store, plan)
  const smtp = createSmtpServer(store, plan)
  const inboxPort = await listen(inbox, ports.inbox)
  const smtpPort = await listen(smtp.server, ports.smtp).catch((error: unknown) => {
    inbox.close()
    throw error
  })
  return {
    smtpUrl: `smtp://127.0.0.1:${smtpPort}`,
    inboxUrl: `http://localhost:${inboxPort}`,
    stop: async () => {
      inbox.closeAllConnections()
      await Promise.all([
        new Promise((resolve) => inbox.close(resolve)),
        new Promise<void>((resolve) => smtp.close(resolve)),
      ])
    },
  }
}

async function listen(server: Server, port: number): Promise<number> {
  server.listen(port, '127.0.0.1')
  await once(server, 'listening')
  return (server.address() as AddressInfo).port
}
