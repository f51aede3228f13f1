import { readFileSync, writeFileSync } from 'node:fs';
import {
  DECADES,
  FILE_VERSION,
  fileNameOf,
  HEADER_BYTES,
  MAGIC,
  RECORD_COUNT,
  RECORD_DOUBLES,
  recordsOf,
} from './layout';

/**
 * Packs DE405 from the table of Debian's casacore-data-jpl-de405 into files by decade.
 *
 *     npm run pack-ephemeris -- path/to/DE405/table.f0i
 *
 * The table holds 1143 records, stride 8160 bytes, of 1018 little-endian doubles from byte 28: the
 * standard DE405 coefficients without the two leading dates, then two zeros. Coefficients are copied
 * bit for bit; nutations and librations (doubles 816 to 1015) are left out.
 */

const TABLE_OFFSET = 28;
const TABLE_STRIDE = 8160;

const path = process.argv[2];
if (path === undefined) {
  process.stderr.write('Usage: npm run pack-ephemeris -- path/to/DE405/table.f0i\n');
  process.exit(2);
}
const table = readFileSync(path);
for (const decade of DECADES) {
  const { first, last } = recordsOf(decade);
  const count = last - first + 1;
  if (first >= RECORD_COUNT || count < 1) throw new Error(`no record for the ${decade}s`);
  const out = Buffer.alloc(HEADER_BYTES + count * RECORD_DOUBLES * 8);
  for (const [i, word] of [MAGIC, FILE_VERSION, first, count].entries()) {
    out.writeUInt32LE(word, i * 4);
  }
  for (let i = 0; i < count; i++) {
    const from = TABLE_OFFSET + (first + i) * TABLE_STRIDE;
    table.copy(out, HEADER_BYTES + i * RECORD_DOUBLES * 8, from, from + RECORD_DOUBLES * 8);
  }
  const file = new URL(`../../public/ephemeris/${fileNameOf(decade)}`, import.meta.url);
  writeFileSync(file, out);
}
