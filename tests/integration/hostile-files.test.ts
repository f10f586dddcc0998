import { gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { Batch, ImportRun } from '@/db/models';
import { InvalidError } from '@/lib/errors';
import { importForm, importPreviewForm } from '@/lib/contracts/imports';
import { exportTable } from '@/lib/services/exports/tables';
import { keepImport } from '@/lib/services/imports/keep';
import { previewImport } from '@/lib/services/imports/preview';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';

useDatabase();

const HEAD = 'time,gravity,temperature\n';
const GOOD = '2026-03-01T00:00:00Z,1.050,18\n';

/** Files that hold no reading at all: a clear refusal, with the reason at the file. */
const REFUSED: Record<string, string> = {
  'only a header': HEAD,
  'only line breaks': '\n\n\n',
  'zero bytes': `${HEAD}2026-03-01T00:00:00Z,1.0\u000050\n`,
  'half of a surrogate pair': `${HEAD}2026-03-01T00:00:00Z,\ud800,18\n`,
  'a quote that never closes': `${HEAD}"2026-03-01T00:00:00Z,1.050,18\n${GOOD.repeat(3)}`,
  'quotes in the middle of a cell': `${HEAD}2026"-03-01,1.05"0,18\n`,
  'two hundred and one columns': `${Array.from({ length: 201 }, (_, index) => `c${index}`).join(',')}\n1\n`,
  'a cell of a megabyte': `${HEAD}${'x'.repeat(1_000_000)},1.05,18\n`,
  'more rows than anybody logs': `${HEAD}${GOOD.repeat(100_001)}`,
  'a million lines': `${HEAD}${'1,2,3\n'.repeat(1_000_000)}`,
  'nothing but delimiters': ';'.repeat(100_000),
  'a spreadsheet, which is a zip': `PK\u0003\u0004\u0014\u0000\u0006\u0000${'\ufffd'.repeat(500)}`,
  'a database': 'SQLite format 3\u0000\u0010\u0000\u0001\u0001\u0000@  \n',
  'a picture': '\ufffdPNG\r\n\u001a\n\u0000\u0000\u0000\rIHDR\n',
};

/** Files in which every line is wrong: each line named, nothing kept. */
const ALL_LINES_WRONG: Record<string, string> = {
  JSON: '{\n"gravity": 1.05,\n"at": "2026-03-01"\n}\n',
  HTML: '<!doctype html>\n<html>\n<script>alert(1)</script>\n</html>\n',
  'a gzip read as text': `head\n${gzipSync('x'.repeat(100)).toString('latin1').replaceAll('"', '').replaceAll('\u0000', '')}\n`,
  'a PDF': '%PDF-1.7\n1 0 obj\n<</Type/Catalog>>\nendobj\n',
  'a page that is a table too': '<!--time,gravity\n2026-03-01T00:00:00Z<b>,1.050</b>\n-->\n',
  'a log cut by bars': 'time|gravity|temperature\n2026-03-01T00:00:00Z|1.050|18\n',
  'a log cut by spaces': 'time gravity temperature\n2026-03-01 1.050 18\n',
  'words for gravities': `${HEAD}2026-03-01T00:00:00Z,one point oh five,18\n`,
  'no such days': `${HEAD}2026-02-30T00:00:00,1.05,18\n2026-13-01,1.05,18\n`,
  'the future': `${HEAD}2126-03-01T00:00:00Z,1.05,18\n`,
  'clocks that were never set': `${HEAD}1970-01-01T00:00:00Z,1.05,18\n`,
  infinities: `${HEAD}2026-03-01T00:00:00Z,Infinity,18\n2026-03-01T00:00:01Z,1e999,18\n2026-03-01T00:00:02Z,NaN,18\n`,
  'gravities that cannot be': `${HEAD}2026-03-01T00:00:00Z,-1.05,18\n2026-03-01T00:00:01Z,1.5,18\n2026-03-01T00:00:02Z,0,18\n`,
  'formulas for times': `${HEAD}=NOW(),1.05,18\n@SUM(A1),1.05,18\n+1,1.05,18\n`,
  'SQL for times': `${HEAD}"2026-03-01'; drop table readings; --",1.05,18\n`,
  'paths and templates': `${HEAD}../../etc/passwd,1.05,18\n\${process.env},1.05,18\n{{7*7}},1.05,18\n`,
  'ANSI escapes': `${HEAD}\u001b[31m2026-03-01,1.05,18\n`,
  'digits of another script': `${HEAD}2026-03-01T00:00:00Z,١.٠٥,18\n`,
  'prototype keys for columns': '__proto__,constructor,toString\n1,2,3\n',
};

describe('log files that are none', () => {
  for (const [name, text] of Object.entries(REFUSED)) {
    it(`are refused with a reason: ${name}`, async () => {
      const actor = await buildMember('brewer');
      await expect(previewImport(actor, importPreviewForm.parse({ kind: 'readings', file_name: 'x.csv', text }))).rejects.toMatchObject({ code: 'invalid', fields: { text: [expect.any(String)] } });
    });
  }

  for (const [name, text] of Object.entries(ALL_LINES_WRONG)) {
    it(`have each line named, and bring nothing: ${name}`, async () => {
      const actor = await buildMember('brewer');
      const seen = await previewImport(actor, importPreviewForm.parse({ kind: 'readings', file_name: 'x.csv', text })).catch((error: unknown) => error);
      if (seen instanceof InvalidError) return expect(seen.fields.text?.[0]).toBeTruthy();
      expect(seen).toMatchObject({ good: 0 });
      const { errors, bad } = seen as Awaited<ReturnType<typeof previewImport>>;
      expect(errors).toHaveLength(bad);
      expect(errors.every((error) => error.line > 1 && error.says.length < 200)).toBe(true);
      await expect(keepImport(actor, importForm.parse({ kind: 'batches', file_name: 'x.csv', text: 'name\n \n', columns: { name: 0, kind: null, pitched: null, ended: null, original_gravity: null, final_gravity: null, volume: null, vessel: null, yeast: null, notes: null } }))).rejects.toMatchObject({ code: 'invalid' });
      expect(await ImportRun.count({ where: { cellarId: actor.cellarId } })).toBe(0);
    });
  }

  it('may begin with a byte order mark, end lines in any way, and be cut by semicolons or tabs', async () => {
    const actor = await buildMember('brewer');
    for (const text of [`\uFEFF${HEAD}${GOOD}`, `${HEAD}${GOOD}`.replaceAll('\n', '\r\n'), `${HEAD}${GOOD}`.replaceAll('\n', '\r'), `${HEAD}${GOOD}`.replaceAll(',', ';'), `${HEAD}${GOOD}`.replaceAll(',', '\t')]) {
      expect(await previewImport(actor, importPreviewForm.parse({ kind: 'readings', file_name: 'x.csv', text })), JSON.stringify(text)).toMatchObject({ good: 1, bad: 0 });
    }
  });

  it('name columns that are not there without harm', async () => {
    const actor = await buildMember('brewer');
    const form = importPreviewForm.parse({ kind: 'readings', file_name: 'x.csv', text: `${HEAD}${GOOD}`, columns: { at: 199, gravity: 150, temperature: null, battery: null, signal: null } });
    expect(await previewImport(actor, form)).toMatchObject({ good: 0, bad: 1 });
    for (const at of [-1, 1.5, 200, 1e9, Number.NaN]) expect(importPreviewForm.safeParse({ ...form, columns: { ...('columns' in form ? form.columns : {}), at } }).success).toBe(false);
    await expect(previewImport(actor, importPreviewForm.parse({ kind: 'readings', file_name: 'x.csv', text: `${HEAD}${GOOD}`, time_zone: '../../etc/localtime' }))).rejects.toMatchObject({ fields: { time_zone: [expect.any(String)] } });
  });
});

/** Names as people and attackers write them; each is kept as it is and shown as text. */
const NAMES = [
  '<script>alert(1)</script>', '"><img src=x onerror=alert(1)>', "Robert'); DROP TABLE batches;--", '${7*7}', '{{constructor.constructor("x")()}}', '../../etc/passwd', '=HYPERLINK("http://x","y")', '+1+1', '-2+3', '@SUM(1)', "'=1", '%00%0a', '\\u0000', 'javascript:alert(1)', '&lt;b&gt;', '‮evil‬', 'a\u200bb', '🍏🍏🍏', 'Ž́͂̓', '__proto__', 'constructor', 'null', 'undefined', 'NaN', '0',
];

describe('names in a list of batches', () => {
  it.each(NAMES)('are kept as text and leave as text: %j', async (name) => {
    const actor = await buildMember('brewer');
    const columns = { name: 0, kind: null, pitched: null, ended: null, original_gravity: null, final_gravity: null, volume: null, vessel: null, yeast: null, notes: null };
    // As a spreadsheet would write it: quoted, and defused where it would be a formula.
    const quoted = `"${(/^'*[=+\-@]/.test(name) ? `'${name}` : name).replaceAll('"', '""')}"`;
    await keepImport(actor, importForm.parse({ kind: 'batches', file_name: `${name.slice(0, 40)}.csv`, text: `name\n${quoted}\n`, columns }));
    const [batch] = await Batch.findAll({ where: { cellarId: actor.cellarId } });
    expect(batch?.name).toBe(name);
    let csv = '';
    for await (const piece of await exportTable(actor, 'batches', null)) csv += piece;
    const again = await buildMember('brewer');
    await keepImport(again, importForm.parse({ kind: 'batches', file_name: 'x.csv', text: csv, columns }));
    expect((await Batch.findAll({ where: { cellarId: again.cellarId } })).map((item) => item.name)).toEqual([name]);
  });

  it.each(['', '   ', '\u0007bell', 'x'.repeat(81), 'a\u007fb'])('are refused where they are none: %j', async (name) => {
    const actor = await buildMember('brewer');
    const seen = await previewImport(actor, importPreviewForm.parse({ kind: 'batches', file_name: 'x.csv', text: `name,notes\n"${name}",x\n` }));
    expect(seen).toMatchObject({ good: 0, bad: 1 });
  });
});
