import { connect } from 'node:net';

const HOST = 'Host: 127.0.0.1\r\n';
const SAME = 'Sec-Fetch-Site: same-origin\r\nContent-Type: application/json\r\n';
const get = (target: string, headers = '') => `GET ${target} HTTP/1.1\r\n${HOST}Connection: close\r\n${headers}\r\n`;
const post = (headers: string, body = '') => `POST /api/v1/batches HTTP/1.1\r\n${HOST}Connection: close\r\n${SAME}${headers}\r\n${body}`;

/** Requests as no browser sends them, byte for byte. */
export const HOSTILE_REQUESTS: Readonly<Record<string, string>> = {
  'a header of 100 kB': get('/api/v1/batches', `X-Long: ${'x'.repeat(100_000)}\r\n`),
  'a cookie of 100 kB': get('/api/v1/batches', `Cookie: fallbright-session=${'x'.repeat(100_000)}\r\n`),
  'a thousand headers': get('/api/v1/batches', Array.from({ length: 1_000 }, (_, index) => `X-${index}: ${'y'.repeat(50)}\r\n`).join('')),
  'an address of 100 kB': get(`/api/v1/batches?q=${'x'.repeat(100_000)}`),
  'a header with a zero byte': get('/api/v1/batches', 'X: a\u0000b\r\n'),
  'a header with a line break in it': get('/api/v1/batches', 'X: a\nSet-Cookie: y\r\n'),
  'a header without a name': get('/api/v1/batches', ': x\r\n'),
  'no host': 'GET /api/v1/batches HTTP/1.1\r\nConnection: close\r\n\r\n',
  'two hosts': get('/api/v1/batches', 'Host: evil.example\r\n'),
  'another host': 'GET /api/v1/batches HTTP/1.1\r\nHost: evil.example\r\nConnection: close\r\n\r\n',
  'an address with its host': get('http://evil.example/api/v1/batches'),
  'an address that climbs': get('/api/v1/../../../../etc/passwd'),
  'an address that climbs in code': get('/api/v1/%2e%2e/%2e%2e/etc/passwd'),
  'an address that cannot be decoded': get('/api/v1/batches/%ff%fe%'),
  'an address with a zero byte': get('/api/v1/batches/%00'),
  'a method there is not': `BREW /api/v1/batches HTTP/1.1\r\n${HOST}Connection: close\r\n\r\n`,
  'PUT where nothing is put': `PUT /api/v1/batches HTTP/1.1\r\n${HOST}Connection: close\r\nContent-Length: 0\r\n\r\n`,
  TRACE: `TRACE /api/v1/batches HTTP/1.1\r\n${HOST}Connection: close\r\n\r\n`,
  CONNECT: `CONNECT evil.example:443 HTTP/1.1\r\n${HOST}Connection: close\r\n\r\n`,
  'another method in a header': get('/api/v1/batches', 'X-HTTP-Method-Override: DELETE\r\n'),
  'two lengths': post('Content-Length: 5\r\nContent-Length: 6\r\n', '{}   '),
  'a length and pieces': post('Content-Length: 5\r\nTransfer-Encoding: chunked\r\n', '0\r\n\r\n'),
  'a length below zero': post('Content-Length: -1\r\n', '{}'),
  'a length that is no number': post('Content-Length: 0x10\r\n', '{}'),
  'pieces of a length that is none': post('Transfer-Encoding: chunked\r\n', 'zz\r\n{}\r\n0\r\n\r\n'),
  'pieces larger than a number holds': post('Transfer-Encoding: chunked\r\n', 'ffffffffffffffffff\r\n{}\r\n0\r\n\r\n'),
  'a coding there is not': post('Transfer-Encoding: gzip, x\r\nContent-Length: 2\r\n', '{}'),
  'HTTP of another century': 'GET /api/v1/batches\r\n\r\n',
  'a version there is not': `GET /api/v1/batches HTTP/9.9\r\n${HOST}\r\n`,
  'no HTTP': '\u0016\u0003\u0001\u0002\u0000\u0001\u0000\u0001\u00fc\u0003\u0003',
  'an upgrade to what is not there': get('/api/v1/batches', 'Upgrade: websocket\r\n'),
  'a range of nothing': get('/icon-192.png', 'Range: bytes=99999999-1,-0,a-b\r\n'),
};

/** The status that the server answers with; null where it only closes the line. */
export function sendRaw(port: number, request: string, patienceMs = 15_000): Promise<number | null> {
  return new Promise((resolve, reject) => {
    const socket = connect(port, '127.0.0.1');
    let heard = '';
    const done = (status: number | null) => {
      clearTimeout(timer);
      socket.destroy();
      resolve(status);
    };
    const timer = setTimeout(() => {
      socket.destroy();
      reject(new Error(`no answer in time, heard ${JSON.stringify(heard.slice(0, 80))}`));
    }, patienceMs);
    socket.on('data', (data) => {
      heard += data.toString('latin1');
      const status = /^HTTP\/1\.[01] (\d{3})/.exec(heard)?.[1];
      if (status !== undefined) done(Number(status));
    });
    socket.on('error', () => done(null));
    socket.on('close', () => done(null));
    socket.write(Buffer.from(request, 'latin1'));
  });
}
