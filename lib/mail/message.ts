/** What a message says, before it has a recipient. Never a name, record number, age or diagnosis: unit, bed, what is due, a link. */
export type Message = { subject: string; text: string; html: string }

export type MessageParts = {
  subject: string
  /** One plain sentence on top. */
  lead: string
  /** Short lines, one thing each. */
  lines: string[]
  link: { label: string; url: string }
  footer: string
}

const escapeHtml = (text: string) =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;')

/** The same content as plain text and as simple HTML that reads well on a phone and in a screen reader. */
export function composeMessage(parts: MessageParts): Message {
  const { subject, lead, lines, link, footer } = parts
  const text = [
    lead,
    '',
    ...lines.map((line) => `- ${line}`),
    ...(lines.length > 0 ? [''] : []),
    `${link.label}: ${link.url}`,
    '',
    footer,
    '',
  ].join('\n')
  const items = lines.map((line) => `<li style="margin:0 0 8px">${escapeHtml(line)}</li>`).join('')
  const html = [
    '<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width">',
    `<title>${escapeHtml(subject)}</title></head>`,
    '<body style="margin:0;padding:24px;background:#F7F5F0;color:#1B2333;font:16px/1.5 sans-serif"><main style="max-width:36em">',
    `<p style="font-size:18px;margin:0 0 16px">${escapeHtml(lead)}</p>`,
    items === '' ? '' : `<ul style="padding-left:20px;margin:0 0 16px">${items}</ul>`,
    `<p style="margin:0 0 24px"><a style="color:#AD430A;font-weight:bold" href="${escapeHtml(link.url)}">${escapeHtml(link.label)}</a></p>`,
    `<p style="color:#566074;font-size:14px;margin:0">${escapeHtml(footer)}</p></main></body></html>`,
  ].join('')
  return { subject, text, html }
}
