import { crc32 } from 'node:zlib';
import { PNG } from 'pngjs';
import { describe, expect, it } from 'vitest';
import { withText } from '../../app/plate/png-text';

/** Chunks of a PNG as its specification (W3C PNG 2003) lays them out, with their checksums tested. */
function chunksOf(png: Uint8Array): { type: string; data: Uint8Array }[] {
  const view = new DataView(png.buffer, png.byteOffset, png.byteLength);
  const chunks: { type: string; data: Uint8Array }[] = [];
  for (let at = 8; at < png.length; ) {
    const length = view.getUint32(at);
    const body = png.subarray(at + 4, at + 8 + length);
    expect(view.getUint32(at + 8 + length)).toBe(crc32(body));
    chunks.push({ type: new TextDecoder().decode(body.subarray(0, 4)), data: body.subarray(4) });
    at += 12 + length;
  }
  return chunks;
}

describe('text in a PNG', () => {
  const image = new PNG({ width: 3, height: 2 });
  image.data.fill(120);
  const png = new Uint8Array(PNG.sync.write(image));

  it('stands behind the header, with checksums that hold, and the picture still decodes', () => {
    const out = withText(png, { Title: 'plate: Ω–ξ', Fingerprint: 'ab12' });
    const chunks = chunksOf(out);
    expect(chunks.map((chunk) => chunk.type).slice(0, 3)).toEqual(['IHDR', 'iTXt', 'iTXt']);
    const texts = chunks
      .filter((chunk) => chunk.type === 'iTXt')
      .map((chunk) => new TextDecoder().decode(chunk.data));
    expect(texts).toEqual(['Title\0\0\0\0\0plate: Ω–ξ', 'Fingerprint\0\0\0\0\0ab12']);
    expect(PNG.sync.read(Buffer.from(out)).data).toEqual(PNG.sync.read(Buffer.from(png)).data);
  });
});
