/** Our own line icons on a 24 grid, stroke 1.6. */
const PATHS = {
  jobs: 'M4 3v18M4 7h8M12 4h5v6h-5zM4 16h14M15 13h5',
  captures: 'M3 4v16h18V4M3 14h4l2-6 3 9 3-12 2 9h4',
  library: 'M7 8V4h14v13h-4M3 8h14v13H3zM6 15l2-3 3 5 3-4',
  teaching: 'M3 4h18v12H3zM12 16v4M7 20h10M7 8h6M7 11h10',
  workshop: 'M3 11l9-7 9 7M6 9v11h12V9M10 20v-6h4v6',
  search: 'M10.5 4a6.5 6.5 0 1 0 0 13a6.5 6.5 0 0 0 0-13zM15.5 15.5L21 21',
  keys: 'M3 6h18v12H3zM6 9.5h1.5M10 9.5h1.5M14 9.5h1.5M17 9.5h1.5M7 14.5h10',
  moon: 'M19.5 14.5A8 8 0 1 1 10 4.5a6.5 6.5 0 0 0 9.5 10z',
  sun: 'M12 8a4 4 0 1 0 0 8a4 4 0 0 0 0-8zM12 2v3M12 19v3M2 12h3M19 12h3M5 5l2 2M17 17l2 2M5 19l2-2M17 7l2-2',
  upload: 'M12 16V4M7 9l5-5 5 5M3 15v5h18v-5',
  share: 'M12 15V3M8 7l4-4 4 4M7 11H4v10h16V11h-3',
  file: 'M5 3h9l5 5v13H5zM14 3v5h5',
  compare: 'M3 8c3-4 6-4 9 0s6 4 9 0M3 16c3-4 6-4 9 0s6 4 9 0',
  keep: 'M6 3h12v18l-6-4-6 4z',
  pin: 'M12 3a4 4 0 1 0 0 8a4 4 0 0 0 0-8zM12 11v10',
  span: 'M4 5v14M20 5v14M4 12h16M7 9l-3 3 3 3M17 9l3 3-3 3',
  plus: 'M12 4v16M4 12h16',
  minus: 'M4 12h16',
  cross: 'M5 5l14 14M19 5L5 19',
  check: 'M4 13l5 5L20 6',
  undo: 'M8 4L4 8l4 4M4 8h10a6 6 0 0 1 0 12H8',
  eye: 'M2 12c4-6.5 16-6.5 20 0c-4 6.5-16 6.5-20 0zM12 9a3 3 0 1 0 0 6a3 3 0 0 0 0-6z',
  caution: 'M12 3L2 20h20zM12 9v6M12 16.5v1.5',
  offline: 'M3 10c5-5 13-5 18 0M7 14c3-3 7-3 10 0M11 18h2M4 3l16 18',
  left: 'M15 4l-8 8 8 8',
  right: 'M9 4l8 8-8 8',
  down: 'M4 9l8 8 8-8',
  more: 'M4 12h2M11 12h2M18 12h2',
  bin: 'M4 7h16M9 7V4h6v3M6 7l1 14h10l1-14M10 11v6M14 11v6',
  person: 'M12 4a4 4 0 1 0 0 8a4 4 0 0 0 0-8zM4 21c0-8 16-8 16 0',
  lanes: 'M3 4h18v7H3zM3 14h18v6H3zM6 8.5l3-2 3 2 3-2 3 2',
  out: 'M12 3v12M7 10l5 5 5-5M3 16v5h18v-5',
  up: 'M4 15l8-8 8 8',
  flip: 'M3 12h18M12 3v6M9 6l3-3 3 3M12 21v-6M9 18l3 3 3-3',
  pause: 'M8 5v14M16 5v14',
} as const;

export type IconName = keyof typeof PATHS;

export function Icon({ name, small = false }: { name: IconName; small?: boolean }) {
  return (
    <svg viewBox="0 0 24 24" className={small ? 'icon icon-small' : 'icon'} aria-hidden="true">
      <path d={PATHS[name]} />
    </svg>
  );
}
