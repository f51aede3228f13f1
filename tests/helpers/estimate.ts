import { type Assessed, assess, type EstimateBasis } from '../../core/assess';
import { readCase } from '../../core/case/read';
import type { OrbitCase, ReadResult } from '../../core/case/types';
import { createEphemeris, loadEphemeris } from '../../core/ephemeris';
import type { EstimateHost } from '../../core/events';
import { createCarrier } from '../../core/uncertainty/carry';
import { fetchPacked, MADE_AT } from './assess';

/** Assesses a text and makes what its estimate needs, all in the test's own process. */
export async function assessText(
  text: string,
  choices: Parameters<typeof readCase>[1] = {},
): Promise<{ assessed: Assessed; basis: EstimateBasis; host: EstimateHost }> {
  const reading = readCase(text, choices);
  if (reading.case === null) throw new Error('the case does not read');
  return estimateOf(text, reading, reading.case);
}

/** The same for a case that needs no reading. */
export async function estimateOf(
  text: string,
  reading: ReadResult,
  orbit: OrbitCase,
): ReturnType<typeof assessText> {
  const ephemeris = createEphemeris();
  const assessed = await assess({ text, reading, case: orbit, madeAt: MADE_AT }, ephemeris, {
    fetchFile: fetchPacked,
    emit: () => {},
    pause: async () => {},
    cancelled: () => false,
  });
  const basis = assessed.estimate;
  if (basis === null) throw new Error('the case has no covariance');
  const { plan } = basis;
  await loadEphemeris(ephemeris, plan.epochTdbSeconds, plan.toTdbSeconds, fetchPacked);
  const carrier = createCarrier(plan, ephemeris);
  return {
    assessed,
    basis,
    host: {
      carry: async (z) => carrier.carry(z),
      parallel: 1,
      emit: () => {},
      stopped: () => false,
    },
  };
}

/** A CCSDS OPM with every entry of its covariance multiplied. */
export const withCovariance = (opm: string, factor: number): string =>
  opm.replace(
    /^(C[XYZ]\S* = )(\S+)$/gm,
    (_, key: string, value: string) => `${key}${Number(value) * factor}`,
  );
