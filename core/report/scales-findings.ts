import { formatNumber, formatSmall } from './figures';
import { figure, finding } from './finding';
import type { Finding } from './report';
import type { Scales } from './scales';

type Triple = [number, number, number];

/** Palermo and Torino scale in sentences, with the range that the size gives; null without a date. */
export function scalesFinding(scales: Scales, caution: string | null): Finding | null {
  const { why, size, cumulativePalermo, highestTorino, dates, assumed } = scales;
  if (why !== null || size === null) {
    return finding('scales', why ?? '', [], BASIS);
  }
  if (cumulativePalermo === null) return null;
  const energies = dates.map(({ energyMt }) => energyMt);
  const most = energies.reduce((a, b) => (b[1] > a[1] ? b : a));
  const said = [
    `Palermo scale ${spread(cumulativePalermo, 1)}${dates.length === 1 ? '' : `, summed over ${dates.length} dates`}; ${torinoWords(highestTorino)}.`,
    `The range is that of the size: diameter ${spread(size.diameterM, 0)}\u2009m, energy ${spreadOf(most, formatSmall)}\u2009Mt of TNT.`,
    ...assumed,
  ];
  return finding(
    'scales',
    said.join(' '),
    [
      figure('Palermo scale, nominal', cumulativePalermo[1], '', 2),
      figure('diameter, nominal', size.diameterM[1], 'm', 0),
      figure('energy, nominal', most[1], 'Mt', formatSmall(most[1])),
    ],
    BASIS,
    null,
    caution,
  );
}

const BASIS: Finding['basis'] = {
  model: 'impact dates of the adopted estimate; a sphere of the given or assumed size and density',
  formula:
    'log10(PI / (f_B ΔT)), f_B = 0.03 E^(−0.8): 0 is as likely as an impact of that size by any other object until then, −2 a hundredth of that; D = 1329 km/√p · 10^(−H/5)',
  source:
    'Chesley et al. 2002; Binzel 2000; Morrison et al. 2004; Fowler & Chillemi 1992; Pravec & Harris 2007',
};

/** "−2.1 (−3.0 to −1.2)", or one figure where all are the same. */
const spread = (of: Triple, decimals: number): string =>
  spreadOf(of, (value) => formatNumber(value, decimals));

function spreadOf([low, nominal, high]: Triple, format: (value: number) => string): string {
  const [a, b, c] = [low, nominal, high].map(format);
  return a === c ? b : `${b} (${a} to ${c})`;
}

function torinoWords(range: Scales['highestTorino']): string {
  if (range === null) return 'Torino scale not defined, more than a hundred years ahead';
  const [low, high] = range;
  return low === high
    ? `Torino scale ${low}`
    : `Torino scale ${low} to ${high}, by the words of its categories and the range of sizes`;
}
