import { answerOf, nothingFound } from './answer';
import { assumptionsFinding, certaintyFinding, othersFinding } from './case-findings';
import { classicalFinding, moidFinding } from './classical-findings';
import { corridorFinding } from './corridor-findings';
import { entryFlightFinding } from './entry-flight-findings';
import type { FindingsDraft } from './finding';
import { moonFinding, nearMoon } from './moon-pass';
import {
  crossingsFinding,
  entryFinding,
  focusingFinding,
  groundFinding,
  orbitFinding,
  speedFinding,
  targetPlaneFinding,
} from './pass-findings';
import { probabilityFindings, probabilitySentence } from './probability-findings';
import type { Finding } from './report';
import { scalesFinding } from './scales-findings';

const CIVIL_PROTECTION_CAUTION =
  'This is an analysis of one orbit solution, not a warning; public warnings and protective action belong to the responsible civil-protection authority.';
const INVENTED_CAUTION = 'This is an invented case: no such object exists.';

/**
 * The findings and the cautions of a report: sentences a person can read aloud, every figure taken
 * from the report itself.
 *
 * @param draft the report's sections
 * @returns     findings, the first of which is the answer; cautions that stand beside everything made
 *              from the report (an approach that reaches the Earth's air or ground; an invented case)
 */
export function writeFindings(draft: FindingsDraft): { findings: Finding[]; cautions: string[] } {
  const main = draft.principal === null ? null : draft.approaches[draft.principal];
  const reachesAir = draft.approaches.some(
    (item) => item.body === 'Earth' && item.outcome !== 'pass',
  );
  const mayHit = (draft.impactProbability?.adopted?.value ?? 0) > 0;
  const caution = reachesAir || mayHit ? CIVIL_PROTECTION_CAUTION : null;
  const mainCaution = main?.body === 'Earth' ? caution : null;
  const moon = main === null ? null : nearMoon(draft, main);
  const probable = probabilitySentence(draft);
  const answer = main === null ? nothingFound(draft) : answerOf(main, moon);
  const findings = [
    {
      ...answer,
      text: probable === null ? answer.text : `${answer.text} ${probable}`,
      kind: 'answer' as const,
      caution,
    },
    ...probabilityFindings(draft, caution),
    draft.scales === undefined ? null : scalesFinding(draft.scales, caution),
    draft.corridor === undefined ? null : corridorFinding(draft.corridor, caution),
    draft.entryFlight?.from === 'impacting clones' ? entryFlightFinding(draft.entryFlight) : null,
    ...(main === null
      ? []
      : [
          entryFinding(main, mainCaution),
          groundFinding(main, mainCaution),
          draft.entryFlight?.from === 'nominal orbit'
            ? entryFlightFinding(draft.entryFlight)
            : null,
          speedFinding(main),
          crossingsFinding(main),
          focusingFinding(main),
          classicalFinding(draft, main),
          targetPlaneFinding(main),
          moon === null ? null : moonFinding(moon),
          orbitFinding(main),
        ]),
    moidFinding(draft),
    othersFinding(draft, main),
    certaintyFinding(main, draft.impactProbability !== undefined),
    assumptionsFinding(draft),
  ].filter((item) => item !== null);
  return {
    findings,
    cautions: [
      ...(caution === null ? [] : [caution]),
      ...(draft.case.invented ? [INVENTED_CAUTION] : []),
    ],
  };
}
