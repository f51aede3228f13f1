/**
 * Text in a PNG: the plate carries its report's fingerprint where a machine can read it.
 * Source: W3C Portable Network Graphics (2003), 11.3.4.5 (iTXt) and annex D (CRC).
 */

const CRC = Uint32Array.from({ length: 256 }, (_, n) => {
  let c = n;
  for (let k = 0; k < 8; k++) c = c & 1 ? 0xedb88320 ^ (c >>> 1) : c >>> 1;
  return c;
});

function crc32(bytes: Uint8Array): number {
  let c = 0xffffffff;
  for (const byte of bytes) c = CRC[(c ^ byte) & 0xff] ^ (c >>> 8);
  return (c ^ 0xffffffff) >>> 0;
}

/** Signature and IHDR: what must come first in the file. */
const HEAD_BYTES = 8 + 4 + 4 + 13 + 4;

/**
 * Puts text chunks behind the header of a PNG.
 *
 * @param png   the bytes of a PNG file
 * @param texts keyword (Latin letters, at most 79) to text (any)
 */
export function withText(png: Uint8Array, texts: Record<string, string>): Uint8Array<ArrayBuffer> {
  const chunks = Object.entries(texts).map(([keyword, text]) => chunkOf(keyword, text));
  const length = chunks.reduce((sum, chunk) => sum + chunk.length, png.length);
  const out = new Uint8Array(length);
  out.set(png.subarray(0, HEAD_BYTES));
  let at = HEAD_BYTES;
  for (const chunk of chunks) {
    out.set(chunk, at);
    at += chunk.length;
  }
  out.set(png.subarray(HEAD_BYTES), at);
  return out;
}

function chunkOf(keyword: string, text: string): Uint8Array {
  const utf8 = new TextEncoder();
  // Keyword, end, no compression (two bytes), no language, no translated keyword, text.
  const content = [...utf8.encode(keyword), 0, 0, 0, 0, 0, ...utf8.encode(text)];
  const body = Uint8Array.from([...utf8.encode('iTXt'), ...content]);
  const chunk = new Uint8Array(4 + body.length + 4);
  const view = new DataView(chunk.buffer);
  view.setUint32(0, content.length);
  chunk.set(body, 4);
  view.setUint32(4 + body.length, crc32(body));
  return chunk;
}
