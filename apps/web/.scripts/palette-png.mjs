import { deflateSync, inflateSync } from 'node:zlib';

const signature = Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]);

/**
 * A PNG of 8-bit RGB or RGBA as one with a palette of 256 colours: enough for screens of flat colours and text, at about a
 * third of the size. Transparency is dropped. PNG: ISO/IEC 15948:2004, sections 9 (filters) and 11 (chunks).
 */
export function toPalettePng(png) {
  const { width, height, channels, pixels } = decode(png);
  const { indices, palette } = quantise(pixels, width * height, channels);
  return encode(width, height, indices, palette);
}

function decode(png) {
  if (!png.subarray(0, 8).equals(signature)) throw new Error('Not a PNG.');
  let offset = 8;
  let header;
  const data = [];
  while (offset < png.length) {
    const length = png.readUInt32BE(offset);
    const type = png.toString('latin1', offset + 4, offset + 8);
    const body = png.subarray(offset + 8, offset + 8 + length);
    if (type === 'IHDR') header = body;
    if (type === 'IDAT') data.push(body);
    offset += 12 + length;
  }
  const width = header.readUInt32BE(0);
  const height = header.readUInt32BE(4);
  const channels = { 2: 3, 6: 4 }[header[9]];
  if (header[8] !== 8 || !channels || header[12] !== 0) throw new Error('Only 8-bit RGB or RGBA without interlace.');
  const raw = inflateSync(Buffer.concat(data));
  const stride = width * channels;
  const pixels = Buffer.alloc(stride * height);
  for (let y = 0; y < height; y += 1) {
    const filter = raw[y * (stride + 1)];
    for (let x = 0; x < stride; x += 1) {
      const here = y * stride + x;
      const left = x >= channels ? pixels[here - channels] : 0;
      const up = y > 0 ? pixels[here - stride] : 0;
      const upLeft = x >= channels && y > 0 ? pixels[here - stride - channels] : 0;
      const predicted = [0, left, up, (left + up) >> 1, filter === 4 ? paeth(left, up, upLeft) : 0][filter];
      pixels[here] = raw[y * (stride + 1) + 1 + x] + predicted;
    }
  }
  return { width, height, channels, pixels };
}

function paeth(left, up, upLeft) {
  const estimate = left + up - upLeft;
  const [a, b, c] = [Math.abs(estimate - left), Math.abs(estimate - up), Math.abs(estimate - upLeft)];
  if (a <= b && a <= c) return left;
  return b <= c ? up : upLeft;
}

/** The 256 colours by median cut over the colours that occur, each weighted by how often. */
function quantise(pixels, count, channels) {
  const occurrences = new Map();
  for (let pixel = 0; pixel < count; pixel += 1) {
    const at = pixel * channels;
    const key = (pixels[at] << 16) | (pixels[at + 1] << 8) | pixels[at + 2];
    occurrences.set(key, (occurrences.get(key) ?? 0) + 1);
  }
  const colours = [...occurrences].map(([key, weight]) => ({
    key,
    weight,
    rgb: [key >> 16, (key >> 8) & 255, key & 255],
  }));
  let boxes = [colours];
  while (boxes.length < 256) {
    const widest = boxes
      .map((box, index) => ({ index, ...spread(box) }))
      .filter(({ index }) => boxes[index].length > 1)
      .sort((a, b) => b.cost - a.cost)[0];
    if (!widest) break;
    const sorted = boxes[widest.index].toSorted((a, b) => a.rgb[widest.channel] - b.rgb[widest.channel]);
    const half = sorted.reduce((sum, { weight }) => sum + weight, 0) / 2;
    let below = 0;
    let cut = 0;
    while (cut < sorted.length - 1 && (cut === 0 || below + sorted[cut].weight <= half)) below += sorted[cut++].weight;
    boxes = boxes.toSpliced(widest.index, 1, sorted.slice(0, cut), sorted.slice(cut));
  }
  const indexOf = new Map();
  const palette = boxes.map((box, index) => {
    for (const { key } of box) indexOf.set(key, index);
    // The commonest colour of a box stands for it: grounds keep their exact tone.
    return box.reduce((most, one) => (one.weight > most.weight ? one : most)).rgb;
  });
  const indices = Buffer.alloc(count);
  for (let pixel = 0; pixel < count; pixel += 1) {
    const at = pixel * channels;
    indices[pixel] = indexOf.get((pixels[at] << 16) | (pixels[at + 1] << 8) | pixels[at + 2]);
  }
  return { indices, palette };
}

function spread(box) {
  let [channel, range] = [0, -1];
  for (const candidate of [0, 1, 2]) {
    const values = box.map(({ rgb }) => rgb[candidate]);
    const width = values.reduce((a, b) => Math.max(a, b)) - values.reduce((a, b) => Math.min(a, b));
    if (width > range) [channel, range] = [candidate, width];
  }
  const weight = box.reduce((sum, one) => sum + one.weight, 0);
  return { channel, cost: range * Math.sqrt(weight) };
}

function encode(width, height, indices, palette) {
  const header = Buffer.alloc(13);
  header.writeUInt32BE(width, 0);
  header.writeUInt32BE(height, 4);
  header.set([8, 3, 0, 0, 0], 8);
  const rows = Buffer.alloc((width + 1) * height);
  for (let y = 0; y < height; y += 1) indices.copy(rows, y * (width + 1) + 1, y * width, (y + 1) * width);
  return Buffer.concat([
    signature,
    chunk('IHDR', header),
    chunk('PLTE', Buffer.from(palette.flat())),
    chunk('IDAT', deflateSync(rows, { level: 9 })),
    chunk('IEND', Buffer.alloc(0)),
  ]);
}

function chunk(type, body) {
  const typed = Buffer.concat([Buffer.from(type, 'latin1'), body]);
  const whole = Buffer.alloc(typed.length + 8);
  whole.writeUInt32BE(body.length, 0);
  typed.copy(whole, 4);
  whole.writeUInt32BE(crc32(typed), typed.length + 4);
  return whole;
}

const crcTable = Uint32Array.from({ length: 256 }, (_value, index) => {
  let crc = index;
  for (let bit = 0; bit < 8; bit += 1) crc = crc & 1 ? 0xedb88320 ^ (crc >>> 1) : crc >>> 1;
  return crc;
});

function crc32(bytes) {
  let crc = 0xffffffff;
  for (const byte of bytes) crc = crcTable[(crc ^ byte) & 255] ^ (crc >>> 8);
  return (crc ^ 0xffffffff) >>> 0;
}
