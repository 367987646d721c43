import { startMailFakeProcess } from '../../server/setup/mailFakeProcess.ts'
import { openTransport } from '../../server/mail/transport.ts'
import { deliverDue } from '../../server/services/outboxWorker.ts'
import { testAppUrl } from './app.ts'

export type Fault = 'refuse' | 421 | 450 | 451 | 550 | 'slow' | 'cutBeforeDot' | 'cutAfterDot'

export interface ReceivedMail {
  id: string
  messageId: string | null
  to: string[]
  subject: string
  text: string | null
  html: string | null
  attachments: { filename: string | null; contentType: string; size: number }[]
}

/** The mail fake as a process of its own, driven over the wire like the real thing. */
export const startMail = async () => {
  const fake = await startMailFakeProcess(0)
  const transport = openTransport(fake.smtpUrl)
  const api = (path: string, init?: RequestInit) =>
    fetch(`${fake.inboxUrl.replace(/\/$/, '')}/api/${path}`, init)
  return {
    smtpUrl: fake.smtpUrl,
    inboxUrl: fake.inboxUrl,
    deliver: () => deliverDue(transport, testAppUrl),
    transport,
    failNext: async (kind: Fault, count = 1, address?: string) => {
      await api('next-failure', {
        method: 'POST',
        headers: { 'Content-Type': 'application/json' },
        body: JSON.stringify({ kind, count, ...(address !== undefined && { address }) }),
      })
    },
    messages: async (to?: string): Promise<ReceivedMail[]> => {
      const list = (await (await api(`messages${to ? `?to=${encodeURIComponent(to)}` : ''}`)).json()) as {
        messages: { id: string }[]
      }
      return Promise.all(
        list.messages.map(async ({ id }) => (await (await api(`messages/${id}`)).json()) as ReceivedMail),
      )
    },
    clear: () => api('messages', { method: 'DELETE' }),
    stop: async () => {
      transport.close()
      await fake.stop()
    },
  }
}

export type Mail = Awaited<ReturnType<typeof startMail>>
