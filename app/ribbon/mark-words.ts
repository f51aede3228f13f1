import type { ApproachBody } from '../../core/report/report';

const INITIALS: Record<ApproachBody, string> = {
  Earth: 'E',
  Moon: 'M',
  Venus: 'V',
  Mars: 'Ma',
  Mercury: 'Me',
  Jupiter: 'J',
};

/** The letters in the ring that marks an approach. */
export function initialOf(body: ApproachBody): string {
  return INITIALS[body];
}
