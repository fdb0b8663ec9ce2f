/** A mail, ready to be queued. */
export interface Mail {
  subject: string
  text: string
  html: string
}

/** What a mail is put together from. */
export type Block =
  | { kind: 'words'; words: string }
  | { kind: 'quote'; words: string }
  | { kind: 'button'; words: string; link: string }
  | { kind: 'list'; title: string; items: readonly { words: string; link: string | null }[]; more: number }

export const words = (text: string): Block => ({ kind: 'words', words: text })
/** What somebody wrote; nothing where they wrote nothing. */
export const quote = (text: string): Block[] => (text.trim() === '' ? [] : [{ kind: 'quote', words: text }])
export const button = (label: string, link: string): Block => ({ kind: 'button', words: label, link })

/** Why somebody gets it, and how not to. */
export interface Footer {
  why: string
  choices: string
  unsubscribe: { words: string; link: string }
}

/** Puts a mail together as plain text and as HTML that says the same. */
export function compose(subject: string, greeting: string, blocks: readonly Block[], footer: Footer | null): Mail {
  return {
    subject: oneLine(subject),
    text: `${[greeting, ...blocks.map(textOf), 'Bayloom', ...(footer ? [footerText(footer)] : [])].join('\n\n')}\n`,
    html: page(subject, [`<p ${style.words}>${escapeHtml(greeting)}</p>`, ...blocks.map(htmlOf)].join('\n'), footer),
  }
}

function textOf(block: Block): string {
  switch (block.kind) {
    case 'words':
      return block.words
    case 'quote':
      return block.words.replace(/^/gm, '> ')
    case 'button':
      return `${block.words}:\n${block.link}`
    case 'list':
      return [
        block.title,
        ...block.items.map((item) => `- ${item.words}${item.link === null ? '' : `\n  ${item.link}`}`),
        ...(block.more > 0 ? [`- and ${block.more} more`] : []),
      ].join('\n')
  }
}

const footerText = ({ why, choices, unsubscribe }: Footer): string =>
  ['--', why, `Choose what you get: ${choices}`, `${capital(unsubscribe.words)}: ${unsubscribe.link}`].join('\n')

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1)

/** Styles stand on the elements: many mail programs know no other place. What a dark one turns around has a class. */
const style = {
  words: 'class="ink" style="margin:0 0 16px;color:#1f2a30"',
  quote:
    'class="ink edge" style="margin:0 0 16px;padding:2px 0 2px 14px;border-left:3px solid #0f6b63;color:#1f2a30;white-space:pre-line"',
  button:
    'class="act" style="display:inline-block;padding:11px 18px;background:#0f6b63;border-radius:3px;color:#ffffff;font-weight:600;text-decoration:none"',
  title: 'class="ink" style="margin:20px 0 6px;font-size:15px;color:#1f2a30"',
  list: 'style="margin:0 0 16px;padding:0;list-style:none"',
  item: 'class="ink line" style="padding:7px 0;border-top:1px solid #c9c6bd;color:#1f2a30"',
  link: 'class="link" style="color:#0f6b63"',
  soft: 'class="soft" style="margin:0 0 6px;color:#5f6b70"',
} as const

const dark = `@media (prefers-color-scheme: dark) {
.paper { background: #14191b !important } .card { background: #1c2326 !important; border-color: #37413f !important }
.ink { color: #eef1ef !important } .soft { color: #a3adad !important } .line { border-color: #37413f !important }
.link { color: #7fd1c7 !important } .edge { border-color: #7fd1c7 !important }
.act { background: #7fd1c7 !important; color: #10201e !important }
}`

function htmlOf(block: Block): string {
  switch (block.kind) {
    case 'words':
      return `<p ${style.words}>${escapeHtml(block.words)}</p>`
    case 'quote':
      return `<blockquote ${style.quote}>${escapeHtml(block.words)}</blockquote>`
    case 'button':
      return `<p style="margin:22px 0"><a href="${escapeHtml(block.link)}" ${style.button}>${escapeHtml(block.words)}</a></p>`
    case 'list':
      return [
        `<h2 ${style.title}>${escapeHtml(block.title)}</h2>`,
        `<ul ${style.list}>`,
        ...block.items.map((item) => `<li ${style.item}>${linked(item)}</li>`),
        ...(block.more > 0 ? [`<li ${style.item}>and ${block.more} more</li>`] : []),
        '</ul>',
      ].join('\n')
  }
}

const linked = ({ words: label, link }: { words: string; link: string | null }): string =>
  link === null ? escapeHtml(label) : `<a href="${escapeHtml(link)}" ${style.link}>${escapeHtml(label)}</a>`

function page(title: string, body: string, footer: Footer | null): string {
  const foot = footer
    ? `<div style="padding:16px 4px 0;font-size:12.5px">
<p ${style.soft}>${escapeHtml(footer.why)}</p>
<p ${style.soft}>${linked({ words: 'Choose what you get', link: footer.choices })} or ${linked(footer.unsubscribe)}.</p>
</div>`
    : ''
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light dark">
<meta name="supported-color-schemes" content="light dark">
<title>${escapeHtml(oneLine(title))}</title>
<style>${dark}</style>
</head>
<body class="paper" style="margin:0;padding:24px 12px;background:#fbfaf6;font:15px/1.5 'Noto Sans',system-ui,sans-serif">
<div style="max-width:600px;margin:0 auto">
<p class="ink" style="margin:0 0 10px 4px;font-size:17px;font-weight:700;color:#1f2a30">Bayloom</p>
<div class="card" style="padding:24px 22px 8px;background:#ffffff;border:1px solid #c9c6bd;border-radius:3px">
${body}
</div>
${foot}
</div>
</body>
</html>
`
}

/** A subject is one header line: what people typed into names must not start another. */
const oneLine = (text: string): string => text.replace(/\p{Cc}+/gu, ' ').slice(0, 200)

const entities: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
}
const escapeHtml = (text: string): string => text.replace(/[&<>"']/g, (sign) => entities[sign] ?? sign)
