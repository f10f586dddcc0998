import type { Texts } from '../texts/texts';
import type { Rendered } from './payload';
import { headerLine } from './words';

/** The parts of a mail. Each is written once and comes out as text and as HTML. */
export type Block =
  /** The state's word, in its colour. */
  | { type: 'state'; word: string; colour: 'madder' | 'ochre' | 'green' | 'ink2' }
  | { type: 'title'; text: string }
  | { type: 'line'; text: string }
  | { type: 'prose'; text: string }
  | { type: 'part'; label: string; text: string }
  /** Under a label, line by line: when, and what. `late` is said in madder. */
  | { type: 'rows'; label: string; rows: Array<{ lead: string; late: boolean; text: string }>; after: string | null }
  /** One vessel in a line, under its state. */
  | { type: 'vessel'; word: string; colour: 'madder' | 'ochre' | 'green' | 'ink2'; text: string }
  | { type: 'figures'; rows: Array<{ name: string; value: string; limit: string | null }> }
  | { type: 'caution'; text: string }
  | { type: 'link'; label: string; url: string }
  /** A second way on, less loud. */
  | { type: 'way'; label: string; url: string; after: string }
  | { type: 'rule' }
  | { type: 'foot'; text: string };

const MONO = "'JetBrains Mono',ui-monospace,Menlo,Consolas,monospace";
const SERIF = "Georgia,'Times New Roman',serif";
const COLOURS = { ink: '#14201A', ink2: '#415047', madder: '#A3241C', ochre: '#7A5200', green: '#1D5B3D' } as const;

const ESCAPES: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' };
export const escapeHtml = (text: string) => text.replace(/[&<>"']/g, (sign) => ESCAPES[sign]!);

const FIGURE = /[−-]?\d+(?:[.:]\d+)*(?:\s(?:°C|°F|°Bx|°P|gal|L\/h|points\/d|points?|%|bar|hours?|h|min|days?|d|L|V)(?![\p{L}]))?/gu;

/** Escaped prose with its figures set in the figures' face. */
function withFigures(text: string): string {
  let out = '';
  let from = 0;
  for (const match of text.matchAll(FIGURE)) {
    out += escapeHtml(text.slice(from, match.index));
    out += `<span style="font-family:${MONO};font-size:.92em;white-space:nowrap">${escapeHtml(match[0])}</span>`;
    from = match.index + match[0].length;
  }
  return out + escapeHtml(text.slice(from));
}

const labelHtml = (label: string) => `<p class="ink2 ruled" style="margin:18px 0 6px;padding-bottom:3px;border-bottom:1px solid #8FA292;font:500 12px/18px ${MONO};color:${COLOURS.ink2}">${escapeHtml(label)}</p>`;

function rowsHtml({ label, rows, after }: Extract<Block, { type: 'rows' }>): string {
  const cells = rows.map(({ lead, late, text }) => `<tr><td class="${late ? 'madder' : 'ink2'}" valign="top" style="padding:3px 14px 3px 0;font:${late ? 560 : 500} 12px/22px ${MONO};color:${late ? COLOURS.madder : COLOURS.ink2};white-space:nowrap">${escapeHtml(lead)}</td><td class="ink" valign="top" style="padding:3px 0;font:400 16px/22px ${SERIF};color:${COLOURS.ink}">${withFigures(text)}</td></tr>`);
  return `${labelHtml(label)}<table role="presentation" cellpadding="0" cellspacing="0" style="border-collapse:collapse;margin:0 0 ${after === null ? 14 : 4}px">${cells.join('')}</table>${after === null ? '' : `<p class="ink2" style="margin:0 0 14px;font:400 14px/20px ${SERIF};color:${COLOURS.ink2}">${withFigures(after)}</p>`}`;
}

function blockHtml(block: Block, { t }: Texts): string {
  switch (block.type) {
    case 'state':
      return `<p class="${block.colour}" style="margin:0 0 4px;font:560 13px/18px ${MONO};color:${COLOURS[block.colour]}">${escapeHtml(block.word)}</p>`;
    case 'title':
      return `<h1 class="ink" style="margin:0 0 6px;font:700 23px/28px ${SERIF};color:${COLOURS.ink}">${withFigures(block.text)}</h1>`;
    case 'line':
      return `<p class="ink2" style="margin:0 0 14px;font:500 13px/19px ${MONO};color:${COLOURS.ink2}">${escapeHtml(block.text)}</p>`;
    case 'prose':
      return `<p class="ink" style="margin:0 0 14px;font:400 16px/23px ${SERIF};color:${COLOURS.ink}">${withFigures(block.text)}</p>`;
    case 'part':
      return `${labelHtml(block.label)}<p class="ink" style="margin:0 0 14px;font:400 16px/23px ${SERIF};color:${COLOURS.ink}">${withFigures(block.text).replaceAll('\n', '<br>')}</p>`;
    case 'rows':
      return rowsHtml(block);
    case 'vessel':
      return `<p class="ink" style="margin:0 0 10px;font:400 16px/23px ${SERIF};color:${COLOURS.ink}"><span class="${block.colour}" style="display:inline-block;min-width:64px;font:560 13px/18px ${MONO};color:${COLOURS[block.colour]}">${escapeHtml(block.word)}</span> ${withFigures(block.text)}</p>`;
    case 'figures':
      return `<table role="presentation" cellpadding="0" cellspacing="0" style="border-collapse:collapse;margin:0 0 14px">${block.rows
        .map(
          (row) =>
            `<tr><td class="ink2" style="padding:2px 16px 2px 0;font:400 14px/20px ${SERIF};color:${COLOURS.ink2}">${escapeHtml(row.name)}</td><td class="ink" style="padding:2px 16px 2px 0;font:650 14px/20px ${MONO};color:${COLOURS.ink};white-space:nowrap">${escapeHtml(row.value)}</td><td class="ink2" style="padding:2px 0;font:500 12px/20px ${MONO};color:${COLOURS.ink2};white-space:nowrap">${row.limit === null ? '' : escapeHtml(t('mail.limit', { value: row.limit }))}</td></tr>`,
        )
        .join('')}</table>`;
    case 'caution':
      return `<p class="ink caution" style="margin:0 0 16px;padding:8px 12px;border-left:4px solid ${COLOURS.madder};font:400 15px/21px ${SERIF};color:${COLOURS.ink}"><strong>${escapeHtml(t('mail.caution'))}</strong> ${withFigures(block.text)}</p>`;
    case 'link':
      return `<p style="margin:18px 0"><a class="button" href="${escapeHtml(block.url)}" style="display:inline-block;padding:11px 16px;border-radius:2px;background:${COLOURS.ink};color:#F4F8F0;font:560 13px/18px ${MONO};text-decoration:none">${escapeHtml(block.label)}</a></p>`;
    case 'way':
      return `<p class="ink2" style="margin:0 0 14px;font:400 14px/20px ${SERIF};color:${COLOURS.ink2}"><a class="ink" href="${escapeHtml(block.url)}" style="color:${COLOURS.ink}">${escapeHtml(block.label)}</a> ${escapeHtml(block.after)}</p>`;
    case 'rule':
      return '<hr class="ruled" style="margin:22px 0;border:0;border-top:1px solid #8FA292">';
    case 'foot':
      return `<p class="ink2" style="margin:0 0 6px;font:400 13px/18px ${SERIF};color:${COLOURS.ink2}">${escapeHtml(block.text)}</p>`;
  }
}

function blockText(block: Block, { t }: Texts): string {
  switch (block.type) {
    case 'state':
      return `[${block.word}]`;
    case 'title':
    case 'line':
      return block.text;
    case 'foot':
    case 'prose':
      return `\n${block.text}`;
    case 'part':
      return `\n${block.label}\n${'-'.repeat(block.label.length)}\n${block.text}`;
    case 'rows':
      return `\n${block.label}\n${'-'.repeat(block.label.length)}\n${[...block.rows.map(({ lead, text }) => `${lead}: ${text}`), ...(block.after === null ? [] : [block.after])].join('\n')}`;
    case 'vessel':
      return `\n[${block.word}] ${block.text}`;
    case 'figures':
      return `\n${block.rows.map((row) => `  ${row.name}: ${row.value}${row.limit === null ? '' : ` (${t('mail.limit', { value: row.limit })})`}`).join('\n')}`;
    case 'caution':
      return `\n${t('mail.caution')} ${block.text}`;
    case 'link':
      return `\n${block.label}: ${block.url}`;
    case 'way':
      return `${block.label}: ${block.url} (${block.after})`;
    case 'rule':
      return `\n${'-'.repeat(40)}\n`;
  }
}

/** The same ink on a dark sheet, for readers that are set to dark. */
const NIGHT = `@media (prefers-color-scheme:dark){body,.sheet{background:#121511!important}.ink{color:#CECAB1!important}.ink2{color:#A8A58F!important}.madder{color:#E58570!important}.ochre{color:#D3A553!important}.green{color:#8DB394!important}.ruled{border-color:#545E51!important}.caution{border-color:#E58570!important}.button{background:#CECAB1!important;color:#121511!important}}`;

export function render(subject: string, blocks: readonly Block[], texts: Texts): Rendered {
  const title = headerLine(subject);
  return {
    subject: title,
    text: `${blocks.map((block) => blockText(block, texts)).join('\n').trim()}\n`,
    html: `<!doctype html><html lang="${escapeHtml(texts.lang)}"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><meta name="color-scheme" content="light dark"><meta name="supported-color-schemes" content="light dark"><title>${escapeHtml(title)}</title><style>${NIGHT}</style></head><body class="sheet" style="margin:0;background:#F1F5ED"><div class="sheet" style="max-width:560px;margin:0 auto;padding:24px 20px;background:#F1F5ED"><p class="ink ruled" style="margin:0 0 20px;padding-bottom:8px;border-bottom:1.5px solid #14201A;font:700 17px/22px ${SERIF};color:${COLOURS.ink}">Fallbright</p>${blocks.map((block) => blockHtml(block, texts)).join('')}</div></body></html>`,
  };
}
