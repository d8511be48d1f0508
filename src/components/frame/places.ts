import type { IconName } from '../base/Icon.tsx';

export type Place = 'jobs' | 'captures' | 'library' | 'teaching' | 'workshop';

export const PLACES: readonly { place: Place; href: string; name: string; icon: IconName }[] = [
  { place: 'jobs', href: '/jobs', name: 'Jobs', icon: 'jobs' },
  { place: 'captures', href: '/captures', name: 'Captures', icon: 'captures' },
  { place: 'library', href: '/library', name: 'Library', icon: 'library' },
  { place: 'teaching', href: '/teaching', name: 'Teaching', icon: 'teaching' },
  { place: 'workshop', href: '/workshop', name: 'Workshop', icon: 'workshop' },
];
