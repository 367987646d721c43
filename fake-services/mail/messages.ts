import { randomUUID } from 'node:crypto'
import { simpleParser, type ParsedMail } from 'mailparser'

export type StoredAttachment = { name: string; contentType: string; content: Buffer }

export type StoredMessage = {
  id: string
  receivedAt: Date
  /** The envelope, which is where the mail really went, whatever its headers say. */
  from: string
  to: string[]
  subject: string
  messageId: string | null
  text: string
  html: string | null
  headers: { name: string; value: string }[]
  attachments: StoredAttachment[]
  /** Length of the raw message in bytes. */
  size: number
}

const maxMessages = 500
const maxBytes = 100 * 1024 * 1024

/** What arrived, newest first, in memory only. The oldest goes when 500 messages or 100 MiB are exceeded. */
export class MessageStore {
  #messages: StoredMessage[] = []

  add(message: StoredMessage): void {
    this.#messages.unshift(message)
    let bytes = 0
    const kept = this.#messages.findIndex((each, index) => {
      bytes += each.size
      return index > 0 && (index >= maxMessages || bytes > maxBytes)
    })
    if (kept !== -1) this.#messages.length = kept
  }

  /** One page of the messages, of all or of one recipient, and how many there are in all. */
  list({ to, page, pageSize }: { to: string | null; page: number; pageSize: number }) {
    const wanted = to?.toLowerCase()
    const found = this.#messages.filter(
      (message) => wanted === undefined || message.to.some((address) => address.toLowerCase() === wanted),
    )
    return { total: found.length, messages: found.slice((page - 1) * pageSize, page * pageSize) }
  }

  find(id: string): StoredMessage | null {
    return this.#messages.find((message) => message.id === id) ?? null
  }

  clear(): void {
    this.#messages = []
  }
}

/** Reads a raw message as it came over the wire. */
export async function readMessage(raw: Buffer, from: string, to: string[]): Promise<StoredMessage> {
  const mail: ParsedMail = await simpleParser(raw)
  return {
    id: randomUUID(),
    receivedAt: new Date(),
    from,
    to,
    subject: mail.subject ?? '',
    messageId: mail.messageId ?? null,
    text: mail.text ?? '',
    html: mail.html || null,
    headers: mail.headerLines.map(({ key, line }) => ({
      name: key,
      value: line.slice(line.indexOf(':') + 1).trim(),
    })),
    attachments: mail.attachments.map((attachment, index) => ({
      name: attachment.filename ?? `attachment-${index + 1}`,
      contentType: attachment.contentType,
      content: attachment.content,
    })),
    size: raw.length,
  }
}

export const summarize = ({ id, receivedAt, from, to, subject, messageId, attachments }: StoredMessage) => ({
  id,
  receivedAt,
  from,
  to,
  subject,
  messageId,
  attachments: attachments.map(({ name, contentType, content }) => ({
    name,
    contentType,
    size: content.length,
  })),
})
