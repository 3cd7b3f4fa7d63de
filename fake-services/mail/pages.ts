import { LINK, type StoredMessage } from './message-store'

const STYLE = `
  :root { color-scheme: light; font: 15px/1.5 system-ui, sans-serif; color: #1d2226; background: #e7e9ea }
  body { margin: 0 auto; max-width: 60rem; padding: 1.5rem 1rem }
  h1 { font-size: 1.25rem; margin: 0 0 1rem }
  main { background: #fff; border: 1px solid #c9cdd0; padding: 1rem; overflow-x: auto }
  form { display: inline-flex; gap: .5rem; flex-wrap: wrap; margin: 0 .5rem 1rem 0 }
  input, button { font: inherit; padding: .25rem .6rem; border: 1px solid #8a9298; background: #fff }
  table { border-collapse: collapse; width: 100% }
  th, td { text-align: left; vertical-align: top; padding: .35rem .6rem .35rem 0; border-bottom: 1px solid #e1e4e6; overflow-wrap: anywhere }
  th { font-weight: 600; white-space: nowrap }
  pre { white-space: pre-wrap; overflow-wrap: anywhere; font: 14px/1.5 ui-monospace, monospace; margin: 1rem 0 }
  a { color: #8a4b16 }
  a:focus-visible, input:focus-visible, button:focus-visible { outline: 2px solid #8a4b16; outline-offset: 2px }
  h2 { font-size: 1rem; margin: 1.25rem 0 .5rem }
  time { font-variant-numeric: tabular-nums; white-space: nowrap }
`

const ENTITIES: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' }

export const escapeHtml = (text: string) => text.replace(/[&<>"']/g, (sign) => ENTITIES[sign] ?? sign)

/** Escaped text whose web addresses can be followed. */
export function linkedText(text: string): string {
  let html = ''
  let end = 0
  for (const { 0: link, index } of text.matchAll(LINK)) {
    html += escapeHtml(text.slice(end, index))
    html += `<a href="${escapeHtml(link)}" rel="noreferrer">${escapeHtml(link)}</a>`
    end = index + link.length
  }
  return html + escapeHtml(text.slice(end))
}

function page(title: string, body: string): string {
  return `<!doctype html>
<html lang="en">
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escapeHtml(title)}</title>
<style>${STYLE}</style>
<h1>${escapeHtml(title)}</h1>
${body}
</html>`
}

const shownTime = (iso: string) => `<time datetime="${iso}">${iso.slice(0, 19).replace('T', ' ')} UTC</time>`

/** Newest first, as a mailbox is read. */
export function listPage(messages: StoredMessage[], to: string): string {
  const rows = [...messages].reverse().map(
    (message) => `<tr>
  <td>${shownTime(message.receivedAt)}</td>
  <td>${escapeHtml(message.envelope.to.join(', '))}</td>
  <td><a href="/messages/${message.id}">${escapeHtml(message.subject || '(no subject)')}</a></td>
</tr>`,
  )
  const none = to ? `No mail to ${escapeHtml(to)}.` : 'No mail yet.'
  const table = `<table><thead><tr><th>Received</th><th>To</th><th>Subject</th></tr></thead><tbody>${rows.join('\n')}</tbody></table>`
  return page(
    'Caught mail',
    `<form method="get" action="/"><input name="to" type="search" aria-label="Recipient's address" placeholder="Recipient's address" value="${escapeHtml(to)}"><button>Show</button></form>
<form method="post" action="/clear"><button>Delete all</button></form>
<main>${rows.length > 0 ? table : `<p>${none}</p>`}</main>`,
  )
}

export function messagePage(message: StoredMessage): string {
  const headers = message.headers.map(({ name, value }) => `<tr><th>${escapeHtml(name)}</th><td>${escapeHtml(value)}</td></tr>`)
  return page(
    message.subject || '(no subject)',
    `<p><a href="/">All mail</a> · <a href="/?to=${encodeURIComponent(message.envelope.to[0] ?? '')}">To this address</a> · <a href="/messages/${message.id}/source">Source</a></p>
<main>
<table><tbody>
<tr><th>From</th><td>${escapeHtml(message.from)}</td></tr>
<tr><th>To</th><td>${escapeHtml(message.to || message.envelope.to.join(', '))}</td></tr>
<tr><th>Received</th><td>${shownTime(message.receivedAt)}</td></tr>
</tbody></table>
<pre>${linkedText(message.text)}</pre>
${htmlPart(message)}
${attachmentList(message)}
<h2>Headers</h2>
<table><tbody>${headers.join('\n')}</tbody></table>
</main>`,
  )
}

/** Shown as its source: the mail's own page is not to run here. */
function htmlPart({ html }: StoredMessage): string {
  return html ? `<h2>HTML part</h2><pre>${escapeHtml(html)}</pre>` : ''
}

function attachmentList({ id, attachments }: StoredMessage): string {
  if (attachments.length === 0) return ''
  const items = attachments.map(
    ({ name, contentType, sizeBytes }, index) => `<li><a href="/messages/${id}/attachments/${index}">${escapeHtml(name)}</a> (${escapeHtml(contentType)}, ${sizeBytes} bytes)</li>`,
  )
  return `<h2>Attachments</h2><ul>${items.join('\n')}</ul>`
}

export const missingPage = () => page('No such mail', '<main><p>It may have been deleted. <a href="/">All mail</a></p></main>')
