// A screenshot with a palette of 256 colours: a third of the bytes, and no difference that a person sees in text and flat areas.
import { deflateSync } from 'node:zlib';

const MOST_COLOURS = 256;

/** Pixels of a PNG as 24-bit numbers, decoded by the browser. */
async function pixelsOf(browser, png) {
  const page = await browser.newPage();
  try {
    const { width, height, text } = await page.evaluate(
      async (source) => {
        const image = new Image();
        image.src = source;
        await image.decode();
        const canvas = new OffscreenCanvas(image.width, image.height).getContext('2d');
        canvas.drawImage(image, 0, 0);
        const { data } = canvas.getImageData(0, 0, image.width, image.height);
        let text = '';
        for (let i = 0; i < data.length; i += 0x4000) text += String.fromCharCode(...data.subarray(i, i + 0x4000));
        return { width: image.width, height: image.height, text: btoa(text) };
      },
      `data:image/png;base64,${png.toString('base64')}`,
    );
    const bytes = Buffer.from(text, 'base64');
    const pixels = Uint32Array.from({ length: width * height }, (_, i) => bytes.readUIntBE(4 * i, 3));
    return { width, height, pixels };
  } finally {
    await page.close();
  }
}

/** The most frequent colours, and for each colour of the picture the index of the nearest of them. */
function paletteOf(pixels) {
  const counts = new Map();
  for (const colour of pixels) counts.set(colour, (counts.get(colour) ?? 0) + 1);
  const palette = [...counts]
    .sort((a, b) => b[1] - a[1])
    .slice(0, MOST_COLOURS)
    .map(([colour]) => colour);
  const apart = (a, b) =>
    [16, 8, 0].reduce((sum, shift) => sum + (((a >> shift) & 255) - ((b >> shift) & 255)) ** 2, 0);
  const nearest = (colour) =>
    palette.reduce((best, one, i) => (apart(colour, one) < apart(colour, palette[best]) ? i : best), 0);
  return { palette, indexOf: new Map([...counts.keys()].map((colour) => [colour, nearest(colour)])) };
}

/** Cyclic redundancy check of PNG (ISO 3309, polynomial 0xedb88320). */
function checkOf(bytes) {
  let check = 0xffffffff;
  for (const byte of bytes) {
    check ^= byte;
    for (let bit = 0; bit < 8; bit++) check = check & 1 ? (check >>> 1) ^ 0xedb88320 : check >>> 1;
  }
  return (check ^ 0xffffffff) >>> 0;
}

function chunk(type, content) {
  const body = Buffer.concat([Buffer.from(type, 'latin1'), content]);
  const [length, check] = [Buffer.alloc(4), Buffer.alloc(4)];
  length.writeUInt32BE(content.length);
  check.writeUInt32BE(checkOf(body));
  return Buffer.concat([length, body, check]);
}

/** @param png a screenshot @returns the same picture as an indexed PNG */
export async function indexedPng(browser, png) {
  const { width, height, pixels } = await pixelsOf(browser, png);
  const { palette, indexOf } = paletteOf(pixels);
  const rows = Buffer.alloc((width + 1) * height);
  for (let y = 0; y < height; y++)
    for (let x = 0; x < width; x++) rows[y * (width + 1) + 1 + x] = indexOf.get(pixels[y * width + x]);
  const header = Buffer.alloc(13);
  header.writeUInt32BE(width, 0);
  header.writeUInt32BE(height, 4);
  header.set([8, 3, 0, 0, 0], 8);
  const colours = Buffer.from(palette.flatMap((colour) => [colour >> 16, (colour >> 8) & 255, colour & 255]));
  const signature = Buffer.from([137, 80, 78, 71, 13, 10, 26, 10]);
  return Buffer.concat([
    signature,
    chunk('IHDR', header),
    chunk('PLTE', colours),
    chunk('IDAT', deflateSync(rows, { level: 9 })),
    chunk('IEND', Buffer.alloc(0)),
  ]);
}
