import { captureEndpoints, pictureEndpoints, uploadEndpoints } from './areas/captures.ts';
import { importEndpoints } from './areas/import.ts';
import { jobEndpoints } from './areas/jobs.ts';
import { libraryEndpoints } from './areas/library.ts';
import { markEndpoints } from './areas/marks.ts';
import { ownerEndpoints } from './areas/owner.ts';
import { pathEndpoints } from './areas/path.ts';
import { peopleEndpoints } from './areas/people.ts';
import { sharingEndpoints } from './areas/sharing.ts';
import { teachingEndpoints } from './areas/teaching.ts';
import { workshopEndpoints } from './areas/workshop.ts';
import { defineEndpoints } from './endpoint.ts';

/** Every endpoint under /api/v1. A route that is not here does not open. */
export const ENDPOINTS = defineEndpoints({
  ...workshopEndpoints,
  ...captureEndpoints,
  ...pictureEndpoints,
  ...uploadEndpoints,
  ...importEndpoints,
  ...markEndpoints,
  ...sharingEndpoints,
  ...libraryEndpoints,
  ...jobEndpoints,
  ...pathEndpoints,
  ...teachingEndpoints,
  ...peopleEndpoints,
  ...ownerEndpoints,
});

export type EndpointId = keyof typeof ENDPOINTS;
