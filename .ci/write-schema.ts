import { writeFileSync } from 'node:fs';
import { publishedSchemas } from '../core/report/schema';

/** Writes the published schemas: npm run schema. */
for (const [name, text] of Object.entries(publishedSchemas())) {
  writeFileSync(new URL(`../public/schema/${name}`, import.meta.url), text);
}
