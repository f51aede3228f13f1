import { readFileSync } from 'node:fs';
import { Ajv, type ValidateFunction } from 'ajv';

/** The bytes of a published schema. */
export const publishedText = (name: string): string =>
  readFileSync(new URL(`../../../public/schema/${name}`, import.meta.url), 'utf8');

/** A validator of a published schema; strict about the schema itself. */
export const published = (name: string): ValidateFunction =>
  new Ajv({ strict: true, allErrors: true }).compile(JSON.parse(publishedText(name)));
