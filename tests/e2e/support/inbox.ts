import { vi } from 'vitest'

/** An e-mail as the fake inbox keeps it. */
export interface Message {
  id: string
  subject: string
  to: string[]
  text: string
  html: string | null
  headers: { name: string; value: string }[]
}

/** E-mails to an address, newest first. */
export const mailTo = async (inboxUrl: string, address: string): Promise<Message[]> => {
  const list = (await (await fetch(`${inboxUrl}/api/messages?to=${encodeURIComponent(address)}`)).json()) as {
    messages: { id: string }[]
  }
  const read = async ({ id }: { id: string }) =>
    (await (await fetch(`${inboxUrl}/api/messages/${id}`)).json()) as Message
  return Promise.all(list.messages.map(read))
}

/** Waits for an e-mail that leads to an address of this shape; gives the newest such e-mail and its link. */
export const waitForLink = (
  inboxUrl: string,
  address: string,
  shape: RegExp,
): Promise<{ message: Message; link: string }> =>
  vi.waitUntil(
    async () => {
      for (const message of await mailTo(inboxUrl, address)) {
        const link = shape.exec(message.text)?.[0]
        if (link) return { message, link }
      }
      return null
    },
    { timeout: 60_000, interval: 250 },
  )
