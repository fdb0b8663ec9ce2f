/** Strokes on a 16-unit square, 1.5 wide. Drawn for this app; each is used beside a word or with a label. */
export const icons = {
  archive: 'M2 3h12v3H2zM3 6v7h10V6M6 9h4',
  back: 'M10 3 5 8l5 5',
  bays: 'M3 2h10v3.4H3zM3 6.3h10v3.4H3zM3 10.6h10V14H3z',
  bell: 'M3.5 11.5h9L11.3 10V7a3.3 3.3 0 0 0-6.6 0v3zM6.7 13.8h2.6M8 3.7V2.4',
  check: 'm3 8.5 3.2 3L13 4.5',
  close: 'm4 4 8 8M12 4l-8 8',
  comment: 'M2.5 3h11v8H7l-3 2.5V11H2.5z',
  copy: 'M5.5 5.5h8v8h-8zM10.5 5.5v-3h-8v8h3',
  down: 'm4 6 4 4 4-4',
  download: 'M8 2v8M4.5 7 8 10.5 11.5 7M2.5 13.5h11',
  edit: 'm3 13 .6-3L10.5 3 13 5.5 6 12.4zM9 4.5 11.5 7',
  eye: 'M1.5 8S4 3.8 8 3.8 14.5 8 14.5 8 12 12.2 8 12.2 1.5 8 1.5 8zM8 6.2a1.8 1.8 0 1 0 0 3.6 1.8 1.8 0 0 0 0-3.6z',
  'eye-off':
    'M2 2l12 12M6 4.2A7 7 0 0 1 8 3.8C12 3.8 14.5 8 14.5 8a11 11 0 0 1-2.1 2.5M3.9 5.3A11 11 0 0 0 1.5 8S4 12.2 8 12.2a6.6 6.6 0 0 0 3-.8',
  leave: 'M6 2.5H3v11h3M7 8h7M11 5l3 3-3 3',
  mail: 'M2 4h12v8.5H2zM2 4.5 8 9l6-4.5',
  menu: 'M2 4h12M2 8h12M2 12h12',
  moon: 'M13 9.5A5.5 5.5 0 1 1 6.5 3 4.5 4.5 0 0 0 13 9.5z',
  more: 'M8 2.8v.6M8 7.7v.6M8 12.6v.6',
  people:
    'M5.5 7.5a2.2 2.2 0 1 0 0-4.5 2.2 2.2 0 0 0 0 4.5zM1.5 13c.2-2.6 1.8-4 4-4s3.8 1.4 4 4M10.5 3.4a2 2 0 0 1 0 3.9M11.5 9.3c1.8.3 2.9 1.6 3 3.7',
  plus: 'M8 3v10M3 8h10',
  restore: 'M3 4v3.5h3.5M3.3 7.3A5 5 0 1 1 3.6 10',
  search: 'M7 2.5a4.5 4.5 0 1 0 0 9 4.5 4.5 0 0 0 0-9zM10.3 10.3 14 14',
  sun: 'M8 5.2a2.8 2.8 0 1 0 0 5.6 2.8 2.8 0 0 0 0-5.6zM8 1.2v1.6M8 13.2v1.6M1.2 8h1.6M13.2 8h1.6M3.2 3.2l1.1 1.1M11.7 11.7l1.1 1.1M3.2 12.8l1.1-1.1M11.7 4.3l1.1-1.1',
  system: 'M2 3h12v8H2zM6 14h4M8 11v3',
  trash: 'M2.5 4h11M6 4V2.5h4V4M4 4l.6 9.5h6.8L12 4M6.7 6.8v4M9.3 6.8v4',
  upload: 'M8 10.5V2.5M4.5 6 8 2.5 11.5 6M2.5 13.5h11',
  user: 'M8 8a2.7 2.7 0 1 0 0-5.4A2.7 2.7 0 0 0 8 8zM2.8 14c.3-3 2.3-4.5 5.2-4.5s4.9 1.5 5.2 4.5',
} as const

export type IconName = keyof typeof icons
