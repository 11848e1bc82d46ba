import { IMAGE_TYPES, PHOTO_LIMITS, PhotoPath, Reading } from '@riseback/contracts';
import { networkRoute, type Route } from '../platform/routes/route-table';
import type { PhotoService } from './photo-service';

const PATH = '/api/networks/:networkId/readings/:readingId/photos/:photoId';

export function photoRoutes(service: PhotoService): Route[] {
  return [
    networkRoute({
      method: 'put',
      path: PATH,
      summary: 'Put a photograph beside a reading; sent again, it is stored once',
      permission: 'readings',
      params: PhotoPath,
      upload: { types: IMAGE_TYPES, limitBytes: PHOTO_LIMITS.bytes },
      answers: { 200: Reading },
      handler: ({ access, params, upload, res }) => {
        res.json(service.add(access, params, upload) satisfies Reading);
      },
    }),
    networkRoute({
      method: 'get',
      path: PATH,
      summary: 'A photograph beside a reading',
      permission: 'view',
      params: PhotoPath,
      answers: { 200: 'a PNG or a JPEG' },
      handler: ({ access, params, res }) => {
        const { mediaType, content } = service.content(access, params);
        res.set('Content-Disposition', `inline; filename="reading.${mediaType === 'image/png' ? 'png' : 'jpg'}"`);
        res.type(mediaType).send(content);
      },
    }),
  ];
}
