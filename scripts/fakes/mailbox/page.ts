import type { StoredMail } from './store';

const ESCAPES: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' };
const escape = (text: string) => text.replace(/[&<>"']/g, (sign) => ESCAPES[sign]!);

const STYLE = `
:root{color-scheme:light dark;--sheet:#F1F5ED;--lit:#F9FBF6;--ink:#14201A;--ink2:#415047;--rule:#8FA292;--focus:#245C84}
@media (prefers-color-scheme:dark){:root{--sheet:#121511;--lit:#171B16;--ink:#CECAB1;--ink2:#A8A58F;--rule:#545E51;--focus:#86AECA}}
*{box-sizing:border-box}body{margin:0;background:var(--sheet);color:var(--ink);font:16px/23px Georgia,serif}
main{max-width:860px;margin:0 auto;padding:16px 24px 40px}header{display:flex;gap:16px;align-items:baseline;border-bottom:1.5px solid var(--ink);padding:0 0 8px;margin:0 0 8px;flex-wrap:wrap}
h1{font-size:26px;line-height:30px;margin:0;flex:1}h2{font-size:22px;line-height:27px;margin:20px 0 6px}
a{color:inherit}a.row{display:grid;grid-template-columns:11em 1fr;gap:2px 16px;padding:10px 0;border-bottom:1px solid var(--rule);text-decoration:none}a.row:hover{background:var(--lit)}
.fig{font:13px/20px ui-monospace,Menlo,Consolas,monospace;color:var(--ink2)}.row b{font-weight:700}.row .fig:last-child{grid-column:2}
button{font:13px/1 ui-monospace,Menlo,Consolas,monospace;padding:9px 12px;border:1px solid var(--ink);border-radius:2px;background:none;color:var(--ink);min-height:32px}
:focus-visible{outline:3px solid var(--focus);outline-offset:2px}iframe{width:100%;height:720px;border:1px solid var(--rule);background:#F1F5ED}pre{white-space:pre-wrap;overflow-wrap:anywhere;font:13px/20px ui-monospace,Menlo,Consolas,monospace;border:1px solid var(--rule);padding:12px;margin:0}
@media (max-width:560px){a.row{grid-template-columns:1fr}.row .fig:last-child{grid-column:1}main{padding:16px}}`;

const page = (title: string, body: string) =>
  `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>${escape(title)}</title><style>${STYLE}</style></head><body><main>${body}</main></body></html>`;

const clock = (iso: string) => iso.replace('T', ' ').slice(0, 19);

export function listPage(mails: readonly StoredMail[]): string {
  const rows = mails
    .map((mail) => `<a class="row" href="/mails/${escape(mail.id)}"><span class="fig">${clock(mail.received_at)}</span><b>${escape(mail.subject || '(no subject)')}</b><span class="fig">to ${escape(mail.to)}</span></a>`)
    .join('');
  const remove = mails.length ? '<form method="post" action="/delete-all"><button>Delete all</button></form>' : '';
  return page('Mailbox', `<header><h1>Mailbox</h1><span class="fig">${mails.length} ${mails.length === 1 ? 'mail' : 'mails'}, times in UTC</span>${remove}</header>${rows || '<p>No mail yet. What Fallbright sends stays here; nothing leaves this machine.</p>'}`);
}

/** The mail's HTML in a frame that may run nothing; its links open beside the page. */
export function mailPage(mail: StoredMail): string {
  const meta = [
    ['from', mail.from],
    ['to', mail.to],
    ['at', `${clock(mail.received_at)} UTC`],
    ['id', mail.message_id ?? 'none'],
  ]
    .map(([name, value]) => `<div class="fig">${name} ${escape(value ?? '')}</div>`)
    .join('');
  const frame = mail.html === null ? '' : `<h2>As HTML</h2><iframe title="The mail as HTML" sandbox="allow-popups allow-popups-to-escape-sandbox" srcdoc="${escape(`<base target="_blank">${mail.html}`)}"></iframe>`;
  return page(mail.subject, `<header><h1>${escape(mail.subject || '(no subject)')}</h1><a class="fig" href="/">All mails</a></header>${meta}${frame}<h2>As text</h2><pre>${escape(mail.text)}</pre>`);
}

export const missingPage = () => page('No such mail', '<header><h1>No such mail</h1><a class="fig" href="/">All mails</a></header><p>It may have been deleted.</p>');
