import { Agent, request, type IncomingHttpHeaders, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { createApp } from '../../server/app.ts'
import { testAppUrl, useApp } from './app.ts'

/** One answer as it came over the wire. */
export interface Answer {
  status: number
  headers: IncomingHttpHeaders
  requestId: string
  body: Buffer
}

export interface Asked {
  method: string
  path: string
  userId: string
  cookie: string[]
  version?: number | undefined
  body?: object | undefined
  file?: Buffer | undefined
}

const boundary = 'sweep-boundary-7f3a'

const multipart = (details: object, file: Buffer) =>
  Buffer.concat([
    Buffer.from(
      `--${boundary}\r\nContent-Disposition: form-data; name="details"\r\n\r\n${JSON.stringify(details)}\r\n` +
        `--${boundary}\r\nContent-Disposition: form-data; name="file"; filename="page.png"\r\n` +
        'Content-Type: image/png\r\n\r\n',
    ),
    file,
    Buffer.from(`\r\n--${boundary}--\r\n`),
  ])

/** The app on a port of its own with kept connections: thousands of requests in one run. */
export const openWire = async () => {
  const app = createApp({
    appUrl: testAppUrl,
    sessionSecret: 'only-for-tests-only-for-tests-only',
    demo: false,
    inboxUrl: null,
    demoSignIns: [],
    clientDir: null,
  })
  useApp(app)
  const agent = new Agent({ keepAlive: true, maxSockets: 12 })
  const server = await new Promise<Server>((resolve) => {
    const listening = app.listen(0, '127.0.0.1', () => resolve(listening))
  })
  const { port } = server.address() as AddressInfo

  const ask = ({ method, path, userId, cookie, version, body, file }: Asked) => {
    const json = body === undefined ? null : Buffer.from(JSON.stringify(body))
    const payload = file ? multipart(body ?? {}, file) : json
    const headers: Record<string, string> = { 'X-Fanflower-User': userId, 'Sec-Fetch-Site': 'same-origin' }
    if (cookie.length > 0) headers.Cookie = cookie.join('; ')
    if (version !== undefined) headers['If-Match'] = `"${version}"`
    if (payload) {
      headers['Content-Type'] = file ? `multipart/form-data; boundary=${boundary}` : 'application/json'
      headers['Content-Length'] = String(payload.length)
    }
    return new Promise<Answer>((resolve, reject) => {
      const sent = request({ host: '127.0.0.1', port, method, path, headers, agent }, (response) => {
        const parts: Buffer[] = []
        response.on('data', (chunk: Buffer) => parts.push(chunk))
        response.on('error', reject)
        response.on('end', () =>
          resolve({
            status: response.statusCode ?? 0,
            headers: response.headers,
            requestId: String(response.headers['x-request-id']),
            body: Buffer.concat(parts),
          }),
        )
      })
      sent.on('error', reject)
      sent.end(payload ?? undefined)
    })
  }

  const close = () =>
    new Promise<void>((resolve) => {
      agent.destroy()
      server.close(() => resolve())
      server.closeAllConnections()
    })
  return { app, ask, close }
}

export type Wire = Awaited<ReturnType<typeof openWire>>
