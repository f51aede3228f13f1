import { useState } from 'react';
import { useDeskStore } from '../../store/context';
import type { ExportKind } from '../../worker/messages';
import { useController } from '../controller-context';

const PLATE_CARRIES = 'The plate carries the answer, the cautions and the findings chosen above.';

const FILES: { kind: ExportKind | 'plate'; word: string; title: string }[] = [
  { kind: 'plate', word: 'Plate', title: 'PNG picture, 2400 × 1350' },
  { kind: 'report-json', word: 'Report', title: 'JSON, full precision' },
  { kind: 'oem', word: 'OEM', title: 'Trajectory, CCSDS OEM' },
  { kind: 'ephemeris-csv', word: 'CSV', title: 'Ephemeris table, CSV' },
  { kind: 'corridor-geojson', word: 'Corridor', title: 'Where it may fall, GeoJSON' },
  { kind: 'case-file', word: 'Case', title: 'Case file, to go on from here' },
];

/** The files that can be handed over; only what belongs to the case on the sheet. */
export function HandOver() {
  const controller = useController();
  const hasReport = useDeskStore((state) => state.report !== null && !state.reportIsStale);
  const hasCorridor = useDeskStore((state) => state.report?.corridor !== undefined);
  const hasCase = useDeskStore((state) => state.reading?.case != null);
  const text = useDeskStore((state) => state.text);
  /** What was said belongs to the text it was said of. */
  const [said, setSaid] = useState({ of: text, words: PLATE_CARRIES });
  const [making, setMaking] = useState(false);

  function canHand(kind: ExportKind | 'plate'): boolean {
    if (kind === 'case-file') return hasCase;
    return hasReport && (kind !== 'corridor-geojson' || hasCorridor);
  }

  async function hand(kind: ExportKind | 'plate') {
    if (making) return;
    setMaking(true);
    const say = (words: string) => setSaid({ of: text, words });
    say('The file is being written.');
    try {
      const name = await (kind === 'plate' ? controller.savePlate() : controller.saveFile(kind));
      say(`Written: ${name}`);
    } catch (error) {
      say(error instanceof Error ? error.message : String(error));
    } finally {
      setMaking(false);
    }
  }

  return (
    <section className="hand-over" aria-labelledby="hand-over-title">
      <h3 id="hand-over-title" className="caps">
        To hand over
      </h3>
      <div className="hand-over-files">
        {FILES.map(({ kind, word, title }) => (
          <button
            key={kind}
            type="button"
            className="button"
            title={title}
            disabled={!canHand(kind)}
            onClick={() => void hand(kind)}
          >
            {word}
          </button>
        ))}
      </div>
      <p className="hand-over-said" role="status">
        {said.of === text ? said.words : PLATE_CARRIES}
      </p>
    </section>
  );
}
