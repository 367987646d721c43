import { createTransport, type Transporter } from 'nodemailer'
import { isLoopbackHost } from '../setup/databaseAccess.ts'

const minute = 60_000

/**
 * The way out for e-mail. TLS with a checked certificate is required except on this machine. Nothing is read from
 * files or addresses; the answer to the final dot may take ten minutes.
 */
export const openTransport = (smtpUrl: string): Transporter => {
  const url = new URL(smtpUrl)
  const host = url.hostname.replace(/^\[|\]$/g, '')
  const local = isLoopbackHost(host)
  const direct = url.protocol === 'smtps:'
  return createTransport({
    host,
    port: Number(url.port || (direct ? 465 : 587)),
    secure: direct,
    ignoreTLS: local && !direct,
    requireTLS: !local && !direct,
    tls: { rejectUnauthorized: !local, minVersion: 'TLSv1.2' },
    ...(url.username && {
      auth: { user: decodeURIComponent(url.username), pass: decodeURIComponent(url.password) },
    }),
    disableFileAccess: true,
    disableUrlAccess: true,
    connectionTimeout: minute,
    greetingTimeout: minute,
    socketTimeout: 10 * minute,
  })
}
