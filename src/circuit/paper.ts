/** Sheets of paper, mm, the short side first: ISO 216 as in ISO 5457, and the two office sizes of North America (from memory). */
export const PAPER_SIZES = {
  A4: [210, 297],
  A3: [297, 420],
  A2: [420, 594],
  A1: [594, 841],
  Letter: [215.9, 279.4],
  Tabloid: [279.4, 431.8],
} as const satisfies Readonly<Record<string, readonly [number, number]>>;

export type PaperSize = keyof typeof PAPER_SIZES;
export const PAPER_NAMES = Object.keys(PAPER_SIZES) as [PaperSize, ...PaperSize[]];

export const ORIENTATIONS = ['landscape', 'portrait'] as const;
export type Orientation = (typeof ORIENTATIONS)[number];

/** What the drawing is laid out on, as the file says it: `A3 landscape`. */
export type Paper = `${PaperSize} ${Orientation}`;
export const PAPERS = PAPER_NAMES.flatMap((size) => ORIENTATIONS.map((way): Paper => `${size} ${way}`));
export const DEFAULT_PAPER: Paper = 'A3 landscape';

/** Width and height in mm. */
export function paperExtent(paper: Paper): { readonly width: number; readonly height: number } {
  const [size, way] = paper.split(' ') as [PaperSize, Orientation];
  const [short, long] = PAPER_SIZES[size];
  return way === 'landscape' ? { width: long, height: short } : { width: short, height: long };
}

/** Fields of `Circuit.title` that the title block has a place for, in the order in which they are asked for. */
export const TITLE_FIELDS = [
  { key: 'machine', head: 'Machine', help: 'What the circuit belongs to' },
  { key: 'number', head: 'Drawing number', help: 'Identifies the drawing' },
  { key: 'revision', head: 'Revision', help: 'Such as A or 02' },
  { key: 'drawn', head: 'Date', help: 'Of this revision; typed, never filled in' },
  { key: 'author', head: 'Author', help: 'Who drew it' },
  { key: 'checked', head: 'Checked', help: 'Who checked it' },
  { key: 'approved', head: 'Approved', help: 'Who approved it' },
  { key: 'owner', head: 'Owner', help: 'Whose drawing it is' },
  { key: 'units', head: 'Units', help: 'In which the figures of the drawing stand' },
] as const;
export type TitleKey = (typeof TITLE_FIELDS)[number]['key'];
