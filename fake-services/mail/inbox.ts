import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http'
import { text } from 'node:stream/consumers'
import { readFailure, type FailurePlan } from './failures.ts'
import { summarize, type MessageStore, type StoredMessage } from './messages.ts'
import { formattedMessage, listPage, messagePage, messagePolicy, missingPage, pagePolicy } from './pages.ts'

const pageSize = 50

const send = (
  response: ServerResponse,
  status: number,
  type: string,
  body: string | Buffer,
  headers = {},
) => {
  response.writeHead(status, {
    'Content-Type': type,
    'Cache-Control': 'no-store',
    'X-Content-Type-Options': 'nosniff',
    'Referrer-Policy': 'no-referrer',
    ...headers,
  })
  response.end(body)
}
const sendJson = (response: ServerResponse, status: number, body: unknown) =>
  send(response, status, 'application/json; charset=utf-8', JSON.stringify(body))
const sendPage = (response: ServerResponse, status: number, html: string, policy = pagePolicy) =>
  send(response, status, 'text/html; charset=utf-8', html, { 'Content-Security-Policy': policy })

const detail = (message: StoredMessage) => ({
  ...summarize(message),
  text: message.text,
  html: message.html,
  headers: message.headers,
})

/**
 * The inbox page and its JSON interface:
 *
 * - GET /, /messages/:id, /messages/:id/html, /messages/:id/attachments/:number for people;
 * - GET /api/messages?to=&page=, GET /api/messages/:id, DELETE /api/messages;
 * - POST /api/next-failure { kind, count, address } (see failures.ts).
 */
export function createInboxServer(store: MessageStore, plan: FailurePlan): Server {
  return createServer((request, response) => {
    handle(request, response, store, plan).catch((error: Error) =>
      sendJson(response, 500, { message: error.message }),
    )
  })
}

async function handle(
  request: IncomingMessage,
  response: ServerResponse,
  store: MessageStore,
  plan: FailurePlan,
) {
  // Another site's page, whose name was pointed at this machine, must not read the mail.
  if (!/^(localhost|127\.0\.0\.1|\[::1\])(:\d+)?$/.test(request.headers.host ?? '')) {
    return sendJson(response, 421, { message: 'This inbox is for this machine only.' })
  }
  const url = new URL(request.url ?? '/', 'http://localhost')
  const [first = '', second, third, fourth] = url.pathname.slice(1).split('/')
  const isApi = first === 'api'
  const listing = () => {
    const to = url.searchParams.get('to')
    const page = Math.max(1, Number.parseInt(url.searchParams.get('page') ?? '1', 10) || 1)
    return { ...store.list({ to, page, pageSize }), to, page, pageSize }
  }

  if (isApi && second === 'next-failure' && request.method === 'POST') {
    if (!request.headers['content-type']?.startsWith('application/json')) {
      return sendJson(response, 415, { message: 'Send JSON.' })
    }
    const failure = readFailure(parseJson(await text(request)))
    if (typeof failure === 'string') return sendJson(response, 422, { message: failure })
    plan.add(failure)
    return sendJson(response, 201, failure)
  }
  if (isApi && second === 'messages' && third === undefined && request.method === 'DELETE') {
    store.clear()
    return sendJson(response, 200, { total: 0 })
  }
  if (request.method !== 'GET' && request.method !== 'HEAD')
    return sendJson(response, 405, { message: 'Not allowed.' })

  if (isApi && second === 'messages' && third === undefined) {
    const { messages, ...rest } = listing()
    return sendJson(response, 200, { ...rest, messages: messages.map(summarize) })
  }
  if (url.pathname === '/') return sendPage(response, 200, listPage(listing()))

  const message = isApi
    ? second === 'messages'
      ? store.find(third ?? '')
      : null
    : first === 'messages'
      ? store.find(second ?? '')
      : null
  if (message === null) {
    return isApi
      ? sendJson(response, 404, { message: 'No such message.' })
      : sendPage(response, 404, missingPage())
  }
  if (isApi) return sendJson(response, 200, detail(message))
  if (third === undefined) return sendPage(response, 200, messagePage(message))
  if (third === 'html') return sendPage(response, 200, formattedMessage(message), messagePolicy)
  const attachment = third === 'attachments' ? message.attachments[Number(fourth)] : undefined
  if (attachment === undefined) return sendPage(response, 404, missingPage())
  return send(response, 200, attachment.contentType, attachment.content, {
    'Content-Disposition': `attachment; filename*=UTF-8''${encodeURIComponent(attachment.name)}`,
    'Content-Security-Policy': "default-src 'none'; sandbox",
  })
}

function parseJson(body: string): unknown {
  try {
    return JSON.parse(body)
  } catch {
    return null
  }
}
