import { ENDPOINTS, type EndpointId } from '../contract/endpoints.ts';
import { createCaptureEndpoint } from './endpoints/create-capture.ts';
import { createPhotoEndpoint } from './endpoints/create-photo.ts';
import { exerciseWindowEndpoint } from './endpoints/exercise-window.ts';
import { exportEndpoint } from './endpoints/export.ts';
import { exportResultsEndpoint } from './endpoints/export-results.ts';
import { jobReportEndpoint } from './endpoints/job-report.ts';
import { knownGoodWindowEndpoint } from './endpoints/known-good-window.ts';
import { originalEndpoint } from './endpoints/original.ts';
import { photoImageEndpoint } from './endpoints/photo-image.ts';
import { pictureEndpoint } from './endpoints/picture.ts';
import { uploadsEndpoint } from './endpoints/uploads.ts';
import { sharedWindowEndpoint, windowEndpoint } from './endpoints/window.ts';
import { exportWorkshopEndpoint, importWorkshopEndpoint } from './endpoints/workshop-archive.ts';
import type { FrontRequest } from './types.ts';

export type FrontEndpoint = (request: FrontRequest) => Promise<void>;

type InFrontId = {
  [Id in EndpointId]: (typeof ENDPOINTS)[Id] extends { readonly inFront: true } ? Id : never;
}[EndpointId];

/** Every endpoint that the contract says is served in front. One without a handler does not compile. */
const HANDLERS: Record<InFrontId, FrontEndpoint> = {
  'captures.create': createCaptureEndpoint,
  'captures.window': windowEndpoint,
  'knownGoods.window': knownGoodWindowEndpoint,
  'captures.original': originalEndpoint,
  'captures.export': exportEndpoint,
  'captures.picture': pictureEndpoint,
  'shared.window': sharedWindowEndpoint,
  'exercises.window': exerciseWindowEndpoint,
  'sets.exportResults': exportResultsEndpoint,
  'jobs.report': jobReportEndpoint,
  'photos.create': createPhotoEndpoint,
  'photos.image': photoImageEndpoint,
  'workshop.export': exportWorkshopEndpoint,
  'workshop.import': importWorkshopEndpoint,
  'uploads.options': uploadsEndpoint('uploads.options'),
  'uploads.create': uploadsEndpoint('uploads.create'),
  'uploads.head': uploadsEndpoint('uploads.head'),
  'uploads.patch': uploadsEndpoint('uploads.patch'),
  'uploads.delete': uploadsEndpoint('uploads.delete'),
};

interface Route {
  readonly id: InFrontId;
  readonly method: string;
  readonly pattern: RegExp;
  readonly run: FrontEndpoint;
}

const ROUTES: readonly Route[] = Object.entries(HANDLERS).map(([id, run]) => {
  const { method, path } = ENDPOINTS[id as InFrontId];
  const pattern = new RegExp(`^/api/v1${path.replace(/\{(\w+)\}/g, '(?<$1>[^/]+)')}$`);
  return { id: id as InFrontId, method, pattern, run };
});

export interface Found {
  readonly id: EndpointId;
  readonly run: FrontEndpoint;
  readonly params: Readonly<Record<string, string>>;
}

/**
 * The endpoint of a request; `methods` when only the method is wrong and no other endpoint of Astro's has the path; null
 * when it is not for us.
 */
export function findRoute(
  method: string,
  path: string,
): Found | { readonly methods: readonly string[] } | null {
  if (!path.startsWith('/api/v1/')) return null;
  const methods: string[] = [];
  for (const route of ROUTES) {
    const match = route.pattern.exec(path);
    if (match === null) continue;
    if (route.method === method) return { id: route.id, run: route.run, params: { ...match.groups } };
    methods.push(route.method);
  }
  // POST /captures is ours, GET /captures is Astro's; under /uploads everything is ours.
  return path.startsWith('/api/v1/uploads') && methods.length > 0 ? { methods } : null;
}
