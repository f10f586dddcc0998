import { byId, endpoint } from './endpoint';
import { photoFile, photoList, photoSchema, photoTarget } from './photos';

/** Photos; data in and out; webhooks. */
export const endpointsData = {
  listBatchPhotos: endpoint({ method: 'GET', path: '/batches/{id}/photos', summary: 'Photos in the log of a batch', access: 'batches.read', params: byId, response: photoList, status: 200 }),
  listLotPhotos: endpoint({ method: 'GET', path: '/lots/{id}/photos', summary: 'Photos of a lot and of its tasting notes', access: 'lots.read', params: byId, response: photoList, status: 200 }),
  keepPhoto: endpoint({ method: 'POST', path: '/photos', summary: 'Hang a photo on an entry, a lot or an own tasting note; the body is the picture itself', access: 'member', query: photoTarget, response: photoSchema, status: 201 }),
  removePhoto: endpoint({ method: 'DELETE', path: '/photos/{id}', summary: 'Take a photo off', access: 'member', params: byId, response: null, status: 204 }),
  openPhoto: endpoint({ method: 'GET', path: '/photos/{id}/{size}', summary: 'A photo’s file; the address is the key, and ends by itself', access: 'anyone', params: photoFile.params, query: photoFile.query, response: null, status: 200 }),
};
