/** Strokes of each icon in a 24 × 24 box, 1.9 wide, round ends. Several paths where dashes differ. */
interface Drawing {
  readonly paths: readonly string[];
  readonly circles?: readonly (readonly [cx: number, cy: number, r: number])[];
  readonly dashed?: readonly { readonly d: string; readonly dash: string }[];
}

export const iconDrawings = {
  today: {
    paths: ["M3 17.5h18M6.5 17.5a5.5 5.5 0 0 1 11 0M12 4v3.5M4.8 8.3l2 2M19.2 8.3l-2 2"],
  },
  sites: { paths: ["M3.5 20V9.5L9 6v14M9 11.5h5.5V20M14.5 20V4.5H20V20M2 20h20"] },
  logs: { paths: ["M4 4.5h16v15H4zM4 15l3-4 3 2.5 3.5-6 3 4 3.5-2"] },
  settings: {
    paths: ["M12 3.5v6M12 14.5v6M3.5 12h6M14.5 12h6"],
    circles: [
      [12, 12, 8.5],
      [12, 12, 2.5],
    ],
  },
  survey: {
    paths: ["M2 13h20M2 20h20", "M5.5 13V9.5h4V13M14.5 13V9.5h4V13M7.5 9.5V6h9v3.5"],
    dashed: [{ d: "M7.5 13l4.5 7 4.5-7", dash: "2 2" }],
  },
  kit: { paths: ["M3 8.5h18v11H3zM8.5 8.5V5h7v3.5M3 13.5h7M14 13.5h7M10 12h4v3h-4z"] },
  statement: {
    paths: ["M5.5 3.5h13v17l-2.2-1.5-2.1 1.5-2.2-1.5-2.2 1.5-2.1-1.5-2.2 1.5zM9 8.5h6M9 12.5h6"],
  },
  compare: {
    paths: ["M3 17c4 0 4.5-10 9-10s5 6 9 6"],
    dashed: [{ d: "M3 20c4 0 4.5-6 9-6s5 3.5 9 3.5", dash: "3 2.5" }],
  },
  more: { paths: ["M4 7h16M4 12h16M4 17h9"] },
  offline: {
    paths: [
      "M3 3l18 18M7 18.5h10a4 4 0 0 0 2.5-7M6.5 9.5A4.5 4.5 0 0 0 7 18.5M9.5 6.5A6 6 0 0 1 17.5 10",
    ],
  },
  download: { paths: ["M12 3v11M7.5 9.5L12 14l4.5-4.5M4 15v5h16v-5"] },
  share: { paths: ["M12 14V3M7.5 7.5L12 3l4.5 4.5M4 15v5h16v-5"] },
  left: { paths: ["M14.5 5l-7 7 7 7"] },
  right: { paths: ["M9.5 5l7 7-7 7"] },
  down: { paths: ["M5 9l7 7 7-7"] },
  up: { paths: ["M5 15l7-7 7 7"] },
  plus: { paths: ["M12 4.5v15M4.5 12h15"] },
  close: { paths: ["M5.5 5.5l13 13M18.5 5.5l-13 13"] },
  camera: { paths: ["M3 8h4.5L9 5.5h6L16.5 8H21v11H3z"], circles: [[12, 13, 3.6]] },
  print: { paths: ["M7 9V3.5h10V9M4 9h16v8h-3M7 17H4V9M7 14h10v6.5H7z"] },
  file: { paths: ["M6 3h8l4.5 4.5V21H6zM14 3v4.5h4.5"] },
  eye: {
    paths: ["M2.5 12c3-5 6-7 9.5-7s6.5 2 9.5 7c-3 5-6 7-9.5 7s-6.500-2-9.5-7z"],
    circles: [[12, 12, 3]],
  },
  eyeShut: {
    paths: ["M2.5 12c3-5 6-7 9.5-7s6.5 2 9.5 7c-3 5-6 7-9.5 7s-6.500-2-9.5-7z", "M4 20L20 4"],
    circles: [[12, 12, 3]],
  },
  edit: { paths: ["M4 20l1-4.5L16.5 4 20 7.5 8.5 19zM14 6.5l3.5 3.5"] },
  archive: { paths: ["M3 4.5h18V9H3zM5 9v10.5h14V9M9.5 13h5"] },
  search: { paths: ["M15.5 15.5L21 21"], circles: [[10.5, 10.5, 6.5]] },
  mail: { paths: ["M3 5.5h18v13H3zM3 6.500l9 7 9-7"] },
  key: { paths: ["M11 12h10M17 12v4M20.500 12v3"], circles: [[7, 12, 4]] },
  people: {
    paths: [
      "M3 20c0-4 2.500-6 6-6s6 2 6 6M16 5.500a3.500 3.500 0 0 1 0 6.500M17.500 14.500c2.500.6 3.500 2.500 3.500 5.500",
    ],
    circles: [[9, 8, 3.5]],
  },
  clock: { paths: ["M12 7v5l3.5 2"], circles: [[12, 12, 8.5]] },
  calendar: { paths: ["M4 6h16v14H4zM4 10.500h16M8.500 3.500v4M15.500 3.500v4"] },
  undo: { paths: ["M8 5L4 9l4 4M4 9h10a5.500 5.500 0 0 1 0 11H9"] },
  sun: {
    paths: [
      "M12 2.500v3M12 18.500v3M2.500 12h3M18.500 12h3M5.300 5.300l2 2M16.700 16.700l2 2M18.700 5.300l-2 2M7.300 16.700l-2 2",
    ],
    circles: [[12, 12, 4]],
  },
  signOut: { paths: ["M10 4H4.500v16H10M15 7.500L19.500 12 15 16.500M19 12H9"] },
  table: { paths: ["M3.500 5h17v14h-17zM3.500 10h17M3.500 14.500h17M9.500 5v14"] },
} as const satisfies Record<string, Drawing>;

export type IconName = keyof typeof iconDrawings;

export function drawingOf(name: IconName): Drawing {
  return iconDrawings[name];
}
