import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getSeries } from '@/lib/services/batches/get-series';

export const GET = route(endpoints.getSeries, async ({ actor, params, query }) => {
  const series = await getSeries(actor, params.id, query);
  return { ...series, at: series.at.map((seconds) => new Date(seconds * 1000).toISOString()) };
});
