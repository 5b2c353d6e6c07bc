/** Line drawings on a 20 × 20 grid, our own; a feature adds the sign that it needs. */
export const iconPaths = {
  add: 'M10 4v12M4 10h12',
  remove: 'M4 10h12',
  close: 'm5 5 10 10M15 5 5 15',
  check: 'm4 10.5 4 4L16 6',
  warning: 'M10 3 18 16.5H2L10 3Zm0 5v4m0 2.3v.2',
  fault: 'M10 2.5a7.5 7.5 0 1 1 0 15 7.5 7.5 0 0 1 0-15Zm0 4v4.5m0 2.6v.2',
  light:
    'M10 6.5a3.5 3.5 0 1 1 0 7 3.5 3.5 0 0 1 0-7ZM10 1.5v2m0 13v2M1.5 10h2m13 0h2M4 4l1.4 1.4m9.2 9.2L16 16m0-12-1.4 1.4M5.4 14.6 4 16',
  dark: 'M16.5 12.2A7 7 0 0 1 7.8 3.5a7 7 0 1 0 8.7 8.7Z',
  system: 'M10 3a7 7 0 1 0 0 14 7 7 0 0 0 0-14Zm0 0v14m0-10.5h6m-6 3.5h7m-7 3.5h6',
  leave: 'M8 3.5H4v13h4M12.5 6.5 16 10l-3.5 3.5M16 10H7.5',
  download: 'M10 3v9.5m-4-4 4 4 4-4M4 16.5h12',
  upload: 'M10 12.5V3m-4 4 4-4 4 4M4 16.5h12',
  print: 'M6 7V3h8v4M6 13H3.5V7h13v6H14m-8-2h8v6H6v-6Z',
  sealed: 'M5 9h10v8H5V9Zm2 0V6.5a3 3 0 0 1 6 0V9',
  play: 'M6 4v12l10-6L6 4Z',
  pause: 'M7 4v12m6-12v12',
  up: 'm5 12 5-5 5 5',
  down: 'm5 8 5 5 5-5',
  back: 'm12 5-5 5 5 5',
  forward: 'm8 5 5 5-5 5',
  edit: 'M4 16l.8-3.6L13.2 4 16 6.8 7.6 15.2 4 16Z',
  link: 'M8.5 11.5a3 3 0 0 0 4.2 0l2.4-2.4a3 3 0 0 0-4.2-4.2l-.9.9m1.5 2.7a3 3 0 0 0-4.2 0l-2.4 2.4a3 3 0 0 0 4.2 4.2l.9-.9',
  undo: 'M4 8h8a4 4 0 0 1 0 8H8M4 8l3.5-3.5M4 8l3.5 3.5',
} as const;

export type IconName = keyof typeof iconPaths;
