import fontUrl from '@fontsource-variable/inter/files/inter-latin-wght-normal.woff2?url';

/** Browsers refuse larger pictures. */
const MOST_PIXELS = 268_000_000;
const LONGEST = 16_384;
export const MM_PER_INCH = 25.4;

let face: Promise<string> | undefined;

/** The typeface as a style for an SVG that stands alone; empty where it cannot be read, then the next one in the list serves. */
export function fontStyle(): Promise<string> {
  face ??= fetch(fontUrl)
    .then((response) => response.blob())
    .then(dataUrl)
    .then((url) => `@font-face{font-family:Inter;font-weight:100 900;src:url(${url}) format('woff2')}`)
    .catch(() => '');
  return face;
}

const dataUrl = (blob: Blob): Promise<string> =>
  new Promise((resolve, reject) => {
    const reader = new FileReader();
    reader.onload = () => resolve(String(reader.result));
    reader.onerror = () => reject(reader.error ?? new Error('The typeface cannot be read.'));
    reader.readAsDataURL(blob);
  });

/** Pixels of a picture; throws where no browser would draw it. */
export function pixelsOf(widthMm: number, heightMm: number, dpi: number): { width: number; height: number } {
  const [width, height] = [widthMm, heightMm].map((mm) => Math.round((mm / MM_PER_INCH) * dpi)) as [number, number];
  if (width > LONGEST || height > LONGEST || width * height > MOST_PIXELS) {
    throw new Error(
      `${width.toLocaleString('en')} × ${height.toLocaleString('en')} pixels are more than browsers draw. Choose a lower resolution or a smaller paper.`,
    );
  }
  return { width, height };
}

/** An SVG of this size on paper as a PNG with that many pixels to the inch. */
export async function pngOf(svg: string, widthMm: number, heightMm: number, dpi: number): Promise<Blob> {
  const { width, height } = pixelsOf(widthMm, heightMm, dpi);
  const url = URL.createObjectURL(new Blob([svg], { type: 'image/svg+xml' }));
  try {
    const image = new Image(width, height);
    image.src = url;
    await image.decode();
    const canvas = document.createElement('canvas');
    canvas.width = width;
    canvas.height = height;
    canvas.getContext('2d')?.drawImage(image, 0, 0, width, height);
    const blob = await new Promise<Blob | null>((resolve) => canvas.toBlob(resolve, 'image/png'));
    if (!blob) throw new Error('The browser gave no picture. Choose a lower resolution.');
    return blob;
  } finally {
    URL.revokeObjectURL(url);
  }
}
