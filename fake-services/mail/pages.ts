import { createHash } from 'node:crypto'
import type { StoredMessage } from './messages.ts'

const style = `
:root { color-scheme: light dark; font: 1rem/1.5 'Source Sans 3', system-ui, sans-serif }
body { margin: 0 auto; max-width: 60rem; padding: 1rem 1.25rem 3rem }
h1 { font-size: 1.5rem; margin: 0.5rem 0 }
nav, .quiet { opacity: 0.85 }
a { color: LinkText; text-underline-offset: 0.15em }
a:focus-visible { outline: 3px solid LinkText; outline-offset: 3px }
ul.mail { list-style: none; margin: 1.5rem 0; padding: 0 }
ul.mail li { border-top: 1px solid GrayText; padding: 0.75rem 0; overflow-wrap: anywhere }
ul.mail a { font-weight: 600 }
dl { display: grid; grid-template-columns: max-content 1fr; gap: 0.25rem 1rem; overflow-wrap: anywhere }
dt { font-weight: 600 } dd { margin: 0 }
pre { font: inherit; white-space: pre-wrap; overflow-wrap: anywhere; border: 1px solid GrayText; padding: 1rem }
iframe { width: 100%; height: 32rem; border: 1px solid GrayText; background: white }
`

/** The one style block is let through by its hash; nothing else may run or load. */
export const pagePolicy =
  `default-src 'none'; style-src 'sha256-${createHash('sha256').update(style).digest('base64')}'; ` +
  `frame-src 'self'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'`

/** For a message's own HTML: no script, nothing fetched, links open in a new tab. */
export const messagePolicy =
  `default-src 'none'; img-src data:; style-src 'unsafe-inline'; base-uri 'none'; form-action 'none'; ` +
  `frame-ancestors 'self'; sandbox allow-popups allow-popups-to-escape-sandbox`

const entities: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
}
const escape = (text: string) => text.replace(/[&<>"']/g, (character) => entities[character] ?? '')

/** Plain text with its web addresses made into links, so that a link in a letter can be followed. */
const withLinks = (text: string) =>
  text
    .split(/(https?:\/\/[^\s<>"']*[^\s<>"'.,;:!?)])/)
    .map((part, index) => (index % 2 === 1 ? `<a href="${escape(part)}">${escape(part)}</a>` : escape(part)))
    .join('')

const at = (date: Date) =>
  `<time datetime="${date.toISOString()}">${new Intl.DateTimeFormat('en-GB', {
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    second: '2-digit',
  }).format(date)}</time>`

const size = (bytes: number) => (bytes < 1024 ? `${bytes} bytes` : `${Math.round(bytes / 1024)} kB`)

const page = (title: string, body: string) => `<!doctype html>
<html lang="en-GB">
<head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escape(title)}</title><style>${style}</style></head>
<body>${body}</body>
</html>
`

type Listing = { messages: StoredMessage[]; total: number; page: number; pageSize: number; to: string | null }

export function listPage({ messages, total, page: number, pageSize, to }: Listing): string {
  const rows = messages.map(
    (message) => `<li><a href="/messages/${message.id}">${escape(message.subject || '(no subject)')}</a><br>
<span class="quiet">to ${escape(message.to.join(', '))}, ${at(message.receivedAt)}${
      message.attachments.length > 0 ? `, ${message.attachments.length} attached` : ''
    }</span></li>`,
  )
  const address = (target: number) =>
    `/?${new URLSearchParams({ page: String(target), ...(to === null ? {} : { to }) }).toString()}`
  const links = [
    ...(number > 1 ? [`<a href="${escape(address(number - 1))}">Newer</a>`] : []),
    ...(number * pageSize < total ? [`<a href="${escape(address(number + 1))}">Older</a>`] : []),
  ]
  const shown = to === null ? '' : ` to ${escape(to)}`
  return page(
    'Demo inbox',
    `<main><h1>Demo inbox</h1>
<p class="quiet">Mail sent here stays on this machine and reaches nobody. It is forgotten when the program stops.</p>
<p>${total === 1 ? '1 message' : `${total} messages`}${shown}.${to === null ? '' : ' <a href="/">Show all</a>'}</p>
${rows.length === 0 ? '<p>Nothing has arrived yet. Load the page again after sending.</p>' : `<ul class="mail">${rows.join('\n')}</ul>`}
${links.length === 0 ? '' : `<nav aria-label="Pages">${links.join(' ')}</nav>`}</main>`,
  )
}

export function messagePage(message: StoredMessage): string {
  const attachments = message.attachments.map(
    ({ name, content }, index) =>
      `<li><a href="/messages/${message.id}/attachments/${index}">${escape(name)}</a> (${size(content.length)})</li>`,
  )
  const title = message.subject || '(no subject)'
  return page(
    title,
    `<nav aria-label="Inbox"><a href="/">All messages</a></nav>
<main><h1>${escape(title)}</h1>
<dl><dt>From</dt><dd>${escape(message.from)}</dd>
<dt>To</dt><dd>${message.to
      .map(
        (address) => `<a href="/?${new URLSearchParams({ to: address }).toString()}">${escape(address)}</a>`,
      )
      .join(', ')}</dd>
<dt>Received</dt><dd>${at(message.receivedAt)}</dd>
<dt>Message-ID</dt><dd>${escape(message.messageId ?? 'none')}</dd></dl>
${attachments.length === 0 ? '' : `<h2>Attached</h2><ul>${attachments.join('\n')}</ul>`}
<h2>Text</h2><pre>${withLinks(message.text) || 'No plain text.'}</pre>
${
  message.html === null
    ? ''
    : `<h2>As formatted</h2><iframe sandbox="allow-popups allow-popups-to-escape-sandbox" title="The message as formatted" src="/messages/${message.id}/html"></iframe>`
}</main>`,
  )
}

/** The message's own HTML, with links opening outside the frame. */
export const formattedMessage = (message: StoredMessage) => `<base target="_blank">${message.html ?? ''}`

export const missingPage = () =>
  page('Not here', '<main><h1>Not here</h1><p>This message is gone. <a href="/">All messages</a></p></main>')
