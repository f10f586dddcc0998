import { sensorOfBearer } from '@/lib/auth/sensor-bearer';
import { endpoints } from '@/lib/contracts/endpoints';
import { addressOf } from '@/lib/http/address';
import { readBytes } from '@/lib/http/body';
import { metrics } from '@/lib/http/metrics';
import { problemOf } from '@/lib/http/problem';
import { inTime } from '@/lib/http/route';
import type { BodyForm } from '@/lib/services/readings/parse';
import { receiveReadings } from '@/lib/services/readings/receive';

/** 500 readings with every field are about 80 kB. */
const BODY_LIMIT_BYTES = 262_144;
const { path, method, status } = endpoints.postTelemetry;

/** The same body as over MQTT, for sensors that speak HTTP only; they sign each message with their own secret. */
export async function POST(request: Request): Promise<Response> {
  const done = metrics().requests.startTimer({ method, route: path });
  const response = await answer(request).catch((error: unknown) => problemOf(error, { method, path }));
  done({ status: response.status });
  return response;
}

async function answer(request: Request): Promise<Response> {
  const sensor = await inTime(sensorOfBearer(request.headers.get('authorization'), addressOf(request)), 'asking');
  // A sensor on a slow line takes its time.
  const body = Buffer.from(await readBytes(request, BODY_LIMIT_BYTES));
  const result = await inTime(receiveReadings(sensor, body, formOf(request.headers.get('content-type'))), 'changing');
  return Response.json(result, { status, headers: { 'cache-control': 'no-store' } });
}

/** Small devices send all sorts of types; what is not SenML is read as JSON or refused with a reason. */
function formOf(type: string | null): BodyForm {
  if (/^application\/senml\+json\b/i.test(type ?? '')) return 'senml';
  return /^application\/json\b/i.test(type ?? '') ? 'json' : 'unknown';
}
