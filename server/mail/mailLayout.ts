/** An e-mail before it becomes MIME. The text part says everything the HTML part says. */
export interface MailContent {
  subject: string
  text: string
  html: string
}

/** A paragraph, or the one thing to press. */
export type MailBlock = string | { label: string; link: string }

export interface MailClinic {
  clinicName: string
  clinicPhone: string
}

const escapes: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
}
const escapeHtml = (text: string) => text.replace(/[&<>"']/g, (character) => escapes[character] ?? '')

/** One line, whatever a clinic's name holds: a line break in a subject would begin a new header. */
export const oneLine = (text: string) => text.replace(/\s+/g, ' ').trim()

const textOf = (block: MailBlock) => (typeof block === 'string' ? block : `${block.label}:\n${block.link}`)

const paragraph = 'margin:0 0 16px'
// Square on one side and round on the other, as everywhere in Fanflower.
const button =
  'display:inline-block;background:#4A3F8F;color:#FFFFFF;font-weight:600;text-decoration:none;padding:13px 22px;border-radius:0 10px 10px 0'

function htmlOf(block: MailBlock) {
  if (typeof block === 'string') return `<p style="${paragraph}">${escapeHtml(block)}</p>`
  const link = escapeHtml(block.link)
  return (
    `<p style="${paragraph}"><a href="${link}" style="${button}">${escapeHtml(block.label)}</a></p>\n` +
    `<p style="${paragraph};font-size:14px;color:#565B73">If that does not open, copy this address into your browser:<br>` +
    `<span style="word-break:break-all">${link}</span></p>`
  )
}

/**
 * Lays out one e-mail: no image, no script, nothing fetched from anywhere, legible in light and dark, and the same words
 * as plain text. Whatever stands in it can be read on a locked screen, so callers keep names and matters out.
 */
export function layOutMail(clinic: MailClinic, subject: string, blocks: readonly MailBlock[]): MailContent {
  const sender = oneLine(clinic.clinicName)
  const foot = `${sender} · Phone ${oneLine(clinic.clinicPhone)}`
  const title = oneLine(subject)
  return {
    subject: title,
    text: `${[...blocks.map(textOf), `-- \n${foot}`].join('\n\n')}\n`,
    html: `<!doctype html>
<html lang="en-GB">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light">
<title>${escapeHtml(title)}</title>
</head>
<body style="margin:0;padding:24px 12px;background:#FBF9F4;color:#1E2235;font:17px/1.55 'Source Sans 3',system-ui,sans-serif">
<div role="article" aria-label="${escapeHtml(title)}" style="max-width:540px;margin:0 auto;background:#FFFFFF;padding:28px 28px 12px;border-left:4px solid #4A3F8F;border-radius:0 20px 20px 0">
<h1 style="margin:0 0 16px;font-size:21px;line-height:1.3">${escapeHtml(title)}</h1>
${blocks.map(htmlOf).join('\n')}
<p style="margin:24px 0 16px;padding-top:14px;border-top:1px solid #8C8775;font-size:14px;color:#565B73">${escapeHtml(foot)}</p>
</div>
</body>
</html>
`,
  }
}
