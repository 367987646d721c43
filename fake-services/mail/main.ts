import { startMailFake } from './server.ts'

const port = (name: string, otherwise: number) => {
  const value = process.env[name]
  return value === undefined || value === '' ? otherwise : Number(value)
}

try {
  const fake = await startMailFake({ smtp: port('SMTP_PORT', 0), inbox: port('INBOX_PORT', 3001) })
  const stop = () => void fake.stop().then(() => process.exit(0))
  process.on('SIGTERM', stop)
  if (process.send === undefined) {
    process.on('SIGINT', stop)
    console.log(`Mail fake: ${fake.smtpUrl}, inbox ${fake.inboxUrl}`)
  } else {
    // Started by the server: it ends us, and when it dies the channel closes.
    process.on('disconnect', () => process.exit(0))
    process.send({ smtpUrl: fake.smtpUrl, inboxUrl: fake.inboxUrl })
  }
} catch (error) {
  const { code, port: taken, message } = error as NodeJS.ErrnoException & { port?: number }
  console.error(
    code === 'EADDRINUSE'
      ? `Port ${taken} is already in use, and the inbox page needs it. Choose another: INBOX_PORT=${(taken ?? 0) + 10} npm start`
      : message,
  )
  process.exit(1)
}
