import type { Report } from '../../core/report/report';

/** A name as it can stand in a file name on any machine: plain letters, digits and hyphens. */
export function slug(name: string): string {
  const plain = name
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .replace(/[^A-Za-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 60);
  return plain === '' ? 'object' : plain;
}

/** What every file of one report begins with: the object's name and the first of the fingerprint. */
export function fileStem(report: Report): string {
  return `${slug(report.case.name)}-${report.fingerprint.slice(0, 8)}`;
}
