import { database } from '../../server/dataSource.ts'
import { OutboxMessage } from '../../server/entities/OutboxMessage.ts'

/** What is queued to an address, newest last, with the text a person would read. */
export const mailsTo = async (recipient: string) => {
  const messages = await database().manager.find(OutboxMessage, {
    where: { recipient },
    order: { createdAt: 'ASC' },
    select: { id: true, kind: true, state: true, problem: true, mime: true, createdAt: true },
  })
  return messages.map(({ mime, ...message }) => ({
    ...message,
    // Quoted-printable breaks long lines with '=' at their end.
    text: mime.toString('utf8').replace(/=\r\n/g, '').replace(/=3D/g, '='),
  }))
}

/** The token of the newest invitation to this address. */
export const invitationToken = async (recipient: string): Promise<string> => {
  const token = /\/invitation#([A-Za-z0-9_-]{43})/.exec((await mailsTo(recipient)).at(-1)?.text ?? '')?.[1]
  if (!token) throw new Error('No invitation was queued to this address')
  return token
}
