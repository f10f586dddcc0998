import { deflateRawSync, deflateSync, gzipSync, brotliCompressSync } from 'node:zlib';

/** A body as it arrives for a new batch. `kept`: it is taken, and this is the name it has then. */
export interface HostileBody {
  what: string;
  body: string | Buffer;
  headers?: Record<string, string>;
  kept?: string;
}

const GOOD = { name: 'Perry', kind: 'cider', volume_l: 4.5, vessel_l: 5 };
const good = (more: object = {}) => JSON.stringify({ ...GOOD, ...more });
const raw = (field: string, literal: string) => JSON.stringify({ ...GOOD, [field]: '§' }).replace('"§"', literal);
const cases = (bodies: Record<string, string | Buffer>): HostileBody[] => Object.entries(bodies).map(([what, body]) => ({ what, body }));

const notJson = cases({
  'plain words': 'a batch of perry', 'a form': 'name=Perry&kind=cider', 'a multipart form': '--x\r\ncontent-disposition: form-data; name="name"\r\n\r\nPerry\r\n--x--', HTML: '<!doctype html><p>Perry', XML: '<?xml version="1.0"?><batch name="Perry"/>', 'an entity bomb': '<!DOCTYPE x [<!ENTITY a "aa"><!ENTITY b "&a;&a;">]><x>&b;</x>', YAML: 'name: Perry\nkind: cider\n', TOML: 'name = "Perry"', 'JSON with comments': `{"name":"Perry",/* x */"kind":"cider"}`, 'JSON with a trailing comma': '{"name":"Perry","kind":"cider",}', 'single quotes': "{'name':'Perry'}", 'bare keys': '{name:"Perry"}', 'two values': `${good()}${good()}`, 'lines of JSON': `${good()}\n${good()}`, 'a callback around it': `cb(${good()})`, 'a guard before it': `)]}'\n${good()}`, undefined: 'undefined', 'a function': 'function(){}', 'a hexadecimal number': raw('volume_l', '0x10'), 'a number with a plus': raw('volume_l', '+4'), 'a number with leading zeros': raw('volume_l', '004'), 'a control character in a text': `{"name":"a\u0001b"}`, 'a line break in a text': '{"name":"a\nb"}', 'an unknown escape': '{"name":"\\x41"}',
});

const WHOLE = good({ place: 'north wall', tag: 7, original_gravity: 1.048 });
const truncated = Array.from({ length: 24 }, (_, index) => Math.round(((index + 1) * (WHOLE.length - 1)) / 25)).map((length) => ({ what: `after ${length} bytes`, body: WHOLE.slice(0, length) }));

const wrongRoot = cases(Object.fromEntries(['null', 'true', 'false', '0', '-0', '1', '1.5', '1e308', '""', '"Perry"', '[]', '[null]', '[[]]', '[1,2,3]', `[${good()}]`, `[${good()},${good()}]`, '{"batch":{}}', `{"batch":${good()}}`, `{"data":[${good()}]}`, '{}', '{"0":{}}', '"{}"', '   null   ', '[{}]'].map((body) => [body, body])));

const FIELDS = ['name', 'kind', 'volume_l', 'vessel_l'] as const;
const keys: HostileBody[] = [
  ...FIELDS.flatMap((missing) => [
    { what: `without ${missing}`, body: JSON.stringify(Object.fromEntries(Object.entries(GOOD).filter(([key]) => key !== missing))) },
    { what: `${missing} named in capitals`, body: JSON.stringify(Object.fromEntries(Object.entries(GOOD).map(([key, value]) => [key === missing ? key.toUpperCase() : key, value]))) },
    { what: `${missing} with a space behind`, body: JSON.stringify(Object.fromEntries(Object.entries(GOOD).map(([key, value]) => [key === missing ? `${key} ` : key, value]))) },
  ]),
  ...['id', 'cellar_id', 'created_by', 'role', 'state', 'import_id', 'toString', ''].map((key) => ({ what: `with ${key || 'an empty key'} besides`, body: good({ [key]: 'x' }), kept: 'Perry' })),
  { what: 'with a thousand keys besides', body: good(Object.fromEntries(Array.from({ length: 1_000 }, (_, index) => [`k${index}`, index]))), kept: 'Perry' },
  { what: 'with a name twice: the last one counts', body: '{"name":"First","name":"Perry","kind":"cider","volume_l":4.5,"vessel_l":5}', kept: 'Perry' },
  { what: 'with a kind twice, wrong at last', body: '{"name":"Perry","kind":"cider","kind":"soup","volume_l":4.5,"vessel_l":5}' },
];

const TYPES: readonly unknown[] = [null, true, false, [], {}, '4.5', '4,5', ' 4.5 ', '4.5 L', '', '1e1', '٤', ['4.5'], { value: 4.5 }];
const types: HostileBody[] = [
  ...TYPES.map((value) => ({ what: `volume ${JSON.stringify(value)}`, body: good({ volume_l: value }) })),
  ...[null, 17, true, [], {}, ['Perry'], { name: 'Perry' }].map((value) => ({ what: `name ${JSON.stringify(value)}`, body: good({ name: value }) })),
  ...[null, 1, ['cider'], 'Cider', 'cider ', 'cider\u0000'].map((value) => ({ what: `kind ${JSON.stringify(value)}`, body: good({ kind: value }) })),
  ...['7', 7.5, '1,048'].map((value) => ({ what: `tag ${JSON.stringify(value)}`, body: good({ tag: value }) })),
];

const numbers: HostileBody[] = ['NaN', 'Infinity', '-Infinity', '+Infinity', '1e999', '-1e999', '1e309', '-0', '0', '1e-400', '0e0', '-1e-400', 'nan', 'inf', '1.#INF', '"NaN"', '"Infinity"', '"1e999"', '"-0"', '1e99999999999', '0.0000000000000000000000001', '-4.5'].map((literal) => ({ what: `volume ${literal}`, body: raw('volume_l', literal) }));

const range: HostileBody[] = [
  ...[-1, 0, 0.0001, 10_001, 1e6, 1e300].map((value) => ({ what: `a vessel of ${value} L`, body: good({ vessel_l: value, volume_l: Math.max(value, 0.1) }) })),
  ...[0, 0.5, 0.9, 1.21, 1.5, 10.48, 48, 1048, -1.048].map((value) => ({ what: `an original gravity of ${value}`, body: good({ original_gravity: value }) })),
  ...[-300, -20, 61, 212, 1e9].map((value) => ({ what: `a temperature of ${value} °C`, body: good({ temperature_min_c: value, temperature_max_c: value }) })),
  ...[-1, 1_000].map((value) => ({ what: `an attenuation of ${value} %`, body: good({ attenuation_min_percent: value, attenuation_max_percent: value }) })),
  { what: 'more drink than vessel', body: good({ volume_l: 6 }) },
  { what: 'a range the wrong way round', body: good({ attenuation_min_percent: 90, attenuation_max_percent: 80 }) },
];

const overflow: HostileBody[] = [0, -1, 1_000, 32_767, 32_768, 40_000, 65_535, 65_536, 2 ** 31 - 1, 2 ** 31, -(2 ** 31) - 1, 2 ** 32, 2 ** 53, 2 ** 53 + 2, -(2 ** 53), 1e18, 9_223_372_036_854_775_807, 1e19, 1e21, 1e100, 1.5, -0.5].map((value) => ({ what: `tag ${value}`, body: good({ tag: value }) }));

const LONG = 'x'.repeat(2_000_000);
const strings: HostileBody[] = [
  ...['', ' ', '\t', '\n', '\u00a0', '\u2003', '\u3000', '\ufeff', '   \n   '].flatMap((text) => [{ what: `name ${JSON.stringify(text)}`, body: good({ name: text }) }, { what: `yeast ${JSON.stringify(text)}`, body: good({ yeast: text }) }]),
  ...['name', 'yeast', 'place', 'drink_colour', 'kind', 'neck'].map((field) => ({ what: `two megabytes of ${field}`, body: good({ [field]: LONG }) })),
  ...['name', 'yeast', 'place'].map((field) => ({ what: `81 characters of ${field}`, body: good({ [field]: 'x'.repeat(81) }) })),
  { what: 'a key of two megabytes', body: good({ [LONG]: 1 }) },
];

const bytes = (...parts: (string | number[])[]) => Buffer.concat(parts.map((part) => Buffer.from(part as string)));
const inName = (...name: number[]) => bytes('{"name":"a', name, 'b","kind":"cider","volume_l":4.5,"vessel_l":5}');
const characters: HostileBody[] = [
  ...[[0xff], [0xfe], [0x80], [0xc0, 0x80], [0xc1, 0xbf], [0xe0, 0x80, 0x80], [0xed, 0xa0, 0x80], [0xed, 0xbf, 0xbf], [0xf4, 0x90, 0x80, 0x80], [0xf8, 0x88, 0x80, 0x80, 0x80], [0xc3], [0xe2, 0x82], [0xf0, 0x9f, 0x8d]].map((name) => ({ what: `the bytes ${name.map((byte) => byte.toString(16)).join(' ')}`, body: inName(...name) })),
  ...['\\u0000', '\\u0007', '\\u001b[31m', '\\u007f', '\\ud800', '\\udc00', '\\ud83c x', '\\udf4f\\ud83c', '\\r\\nSet-Cookie: x', '\\u2028', '\\u2029'].map((escape) => ({ what: `a name with ${escape}`, body: raw('name', `"a${escape}b"`) })),
  ...['🍏🍯', '𠮷野', '‮evil‬', 'a\u200bb', '\u202dleft', 'Ž́͂̓', '👩‍👩‍👧‍👦', 'مرحبا', 'שלום', 'ﷺ'].map((name) => ({ what: `the name ${name}`, body: good({ name }), kept: name.trim() })),
];

const deep = (open: string, close: string, times: number, core = '') => open.repeat(times) + core + close.repeat(times);
const nesting: HostileBody[] = [100, 1_000, 10_000, 50_000, 100_000].flatMap((times) => [
  { what: `${times} lists`, body: deep('[', ']', times) },
  { what: `${times} objects`, body: deep('{"a":', '}', times, '1') },
  { what: `${times} lists in the name`, body: raw('name', deep('[', ']', times)) },
  { what: `${times} objects in the volume`, body: raw('volume_l', deep('{"a":', '}', times, '1')) },
  { what: `${times} lists never closed`, body: '['.repeat(times) },
]);

const prototypes: HostileBody[] = [
  ...['__proto__', 'constructor', 'prototype', 'hasOwnProperty', 'toString', 'valueOf', '__defineGetter__', '__lookupSetter__', 'isPrototypeOf', 'then', 'toJSON', 'length'].map((key) => ({ what: `${key} besides`, body: good().replace('{', `{"${key}":{"polluted":true,"role":"keeper"},`), kept: 'Perry' })),
  ...['{"__proto__":{"name":"Perry","kind":"cider","volume_l":4.5,"vessel_l":5}}', '{"constructor":{"prototype":{"name":"Perry"}}}', '{"__proto__":null}', '{"__proto__":[]}'].map((body) => ({ what: body, body })),
  ...['__proto__', 'constructor', 'toString'].flatMap((value) => ['kind', 'neck', 'vessel_kind'].map((field) => ({ what: `${field} ${value}`, body: good({ [field]: value }) }))),
];

const cbor = Buffer.from('a4646e616d65655065727279646b696e6465636964657268766f6c756d655f6cfb40120000000000006876657373656c5f6c05', 'hex');
const coded: HostileBody[] = [
  { what: 'a byte order mark before it', body: bytes([0xef, 0xbb, 0xbf], good()), kept: 'Perry' },
  ...cases({ 'two byte order marks': bytes([0xef, 0xbb, 0xbf, 0xef, 0xbb, 0xbf], good()), 'UTF-16, little end first': Buffer.from(`\ufeff${good()}`, 'utf16le'), 'UTF-16, big end first': Buffer.from(`\ufeff${good()}`, 'utf16le').swap16(), 'UTF-32': Buffer.concat([...good()].map((character) => Buffer.from([character.charCodeAt(0), 0, 0, 0]))), gzip: gzipSync(good()), deflate: deflateSync(good()), 'raw deflate': deflateRawSync(good()), brotli: brotliCompressSync(good()), 'gzip that unfolds to 50 MB': gzipSync(Buffer.alloc(50_000_000)), CBOR: cbor, MessagePack: Buffer.from('84a46e616d65a55065727279a46b696e64a56369646572', 'hex'), BSON: Buffer.from('160000000378000e000000026e616d6500020000007800000000', 'hex'), 'a zip': Buffer.from('504b0304140000000800', 'hex'), base64: Buffer.from(good()).toString('base64'), 'percent signs': encodeURIComponent(good()), 'a protocol buffer': Buffer.from('0a055065727279', 'hex') }),
  ...['gzip', 'deflate', 'br', 'zstd', 'gzip, gzip', 'x'].map((coding) => ({ what: `gzip that says it is ${coding}`, body: gzipSync(good()), headers: { 'content-encoding': coding } })),
];

const TIMES = ['', 'now', 'yesterday', '2026-03-04', '2026-03-04T06:00', '2026-03-04T06:00:00', '2026-03-04 06:00:00Z', '04/03/2026 06:00', '2026-02-30T00:00:00Z', '2026-13-01T00:00:00Z', '2026-00-10T00:00:00Z', '2026-03-04T24:00:00Z', '2026-03-04T25:00:00Z', '2026-03-04T06:60:00Z', '2026-06-30T12:59:60Z', '2026-03-04T06:00:00+25:00', '2026-03-04T06:00:00Z[Europe/Berlin]', '2026-W10-3', '2026-063', 'T06:00:00Z', '１０２６-03-04T06:00:00Z', '2025-02-29T00:00:00Z', '+012026-03-04T06:00:00Z', 'P1D'];
const times: HostileBody[] = [
  ...TIMES.map((time) => ({ what: `pitched ${JSON.stringify(time)}`, body: good({ pitched_at: time }) })),
  ...[0, 1772600400, 1772600400000, -1, 1e18, true, {}].map((time) => ({ what: `pitched ${JSON.stringify(time)}`, body: good({ pitched_at: time }) })),
];

const units: HostileBody[] = [
  ...['1.048', '1048', '48', '12 °P', '12°P', '11.9 Brix', '1.048 SG', '1,048'].map((value) => ({ what: `gravity ${value}`, body: good({ original_gravity: value }) })),
  ...[48, 1048, 12, 11.9, 104.8].map((value) => ({ what: `gravity ${value}`, body: good({ original_gravity: value }) })),
  ...['18 °C', '64F', '64 °F', '291 K'].map((value) => ({ what: `warmth ${value}`, body: good({ temperature_min_c: value, temperature_max_c: value }) })),
  ...[64.4, 291.15].map((value) => ({ what: `warmth ${value}`, body: good({ temperature_min_c: value, temperature_max_c: value }) })),
  ...['4.5 L', '1 gal', '4500 ml', '1,2 gal'].map((value) => ({ what: `volume ${value}`, body: good({ volume_l: value }) })),
  { what: 'a volume in millilitres', body: good({ volume_l: 4500, vessel_l: 5000 * 1000 }) },
];

/** Text that means something to somebody else; every name keeps it as it is. */
const FOREIGN = ["Robert'); DROP TABLE batches;--", "' OR '1'='1", '1; SELECT pg_sleep(10)', '<script>alert(1)</script>', '"><img src=x onerror=alert(1)>', '<svg/onload=alert(1)>', '<iframe srcdoc=x>', '</title><script>', 'javascript:alert(1)', '${7*7}', '{{7*7}}', '<%= 7*7 %>', '#{7*7}', '{{constructor.constructor("x")()}}', '../../etc/passwd', '..\\..\\win.ini', '/etc/passwd%00.png', 'file:///etc/passwd', '$(id)', '`id`', '| id', '; ls', '%0d%0aSet-Cookie:x=1', '%n%s%x', '=cmd|calc', '@SUM(A1)', '+1', '-1', '${jndi:ldap://x.example/a}', '*)(uid=*', "'; exec xp_cmdshell('x')"];
const foreign: HostileBody[] = FOREIGN.map((name) => ({ what: name, body: good({ name }), kept: name }));

/** Class by class as they are named where the faults to survive are listed. */
export const HOSTILE_BODIES: Readonly<Record<string, readonly HostileBody[]>> = {
  'no JSON': notJson,
  'JSON that ends too soon': truncated,
  'another root': wrongRoot,
  'keys missing, besides and twice': keys,
  'other types, numbers as text, commas': types,
  'numbers that are none': numbers,
  'outside what can be': range,
  'whole numbers too large': overflow,
  'texts empty and far too long': strings,
  'bytes, characters and directions': characters,
  'nested deep': nesting,
  'keys of the prototype': prototypes,
  'marks, packings and other forms': coded,
  times,
  'units mixed': units,
  'SQL, HTML, scripts, templates, paths, logs in a name': foreign,
};
