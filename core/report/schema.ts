import { type ConversionConfig, toJsonSchema } from '@valibot/to-json-schema';
import { CASE_FILE_VERSION, caseFileSchema } from '../case/case-file';
import { REPORT_VERSION, reportSchema } from './report';

/** The published JSON schemas by file name, made from the types that the code itself checks with. */
export function publishedSchemas(): Record<string, string> {
  const text = (id: string, title: string, description: string, schema: object): string =>
    `${JSON.stringify({ ...schema, $id: id, title, description }, null, 2)}\n`;
  const options: ConversionConfig = {
    errorMode: 'ignore',
    // A vector has three components, not three or more.
    overrideSchema: ({ valibotSchema, jsonSchema }) =>
      valibotSchema.type === 'tuple' ? { ...jsonSchema, additionalItems: false } : jsonSchema,
  };
  return {
    'report.schema.json': text(
      `skimline-report-${REPORT_VERSION}`,
      `Skimline report, version ${REPORT_VERSION}`,
      'One assessment of one orbit solution. Units stand in the key names; angles are degrees; jdTdb is a Julian date TDB, tdbSeconds the same instant as TDB seconds past J2000; heliocentric elements are on the ecliptic and equinox of J2000, vectors on ICRF axes. The fingerprint is SHA-256 of the canonical JSON (sorted keys, no spaces) without madeAt and fingerprint.',
      toJsonSchema(reportSchema, options),
    ),
    'case.schema.json': text(
      `skimline-case-${CASE_FILE_VERSION}`,
      `Skimline case file, version ${CASE_FILE_VERSION}`,
      'Everything the desk knows of one case: the case as understood, the text it was read from, what was set by hand, and the state of the desk. Units stand in the key names. lowerTriangle holds the 21 entries of the covariance of position and velocity by rows: km², km²/s, km²/s².',
      toJsonSchema(caseFileSchema, options),
    ),
  };
}
