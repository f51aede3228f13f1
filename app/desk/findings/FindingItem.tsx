import type { Finding } from '../../../core/report/report';
import { useDeskStore } from '../../store/context';
import { useController } from '../controller-context';
import { unbroken, withUnit } from '../figures';
import { Caution } from './Caution';

/** One sentence with its figures, where they come from, and what can be done with it. */
export function FindingItem({ finding }: { finding: Finding }) {
  const controller = useController();
  const { id, kind, text, figures, basis, caution, tdbSeconds } = finding;
  const onPlate = useDeskStore((state) => state.plateFindings.includes(id));
  return (
    <li className={`finding finding-${kind}`}>
      {kind === 'caution' ? (
        <Caution text={text} />
      ) : (
        <p className="finding-text">{unbroken(text)}</p>
      )}
      {figures.length > 0 && (
        <dl className="finding-figures">
          {figures.map((figure) => (
            <div key={figure.label}>
              <dt>{figure.label}</dt>
              <dd className="figures">{withUnit(figure.text, figure.unit)}</dd>
            </div>
          ))}
        </dl>
      )}
      {caution !== null && <Caution text={caution} />}
      <div className="finding-tools">
        <details className="fold finding-basis">
          <summary>Where this comes from</summary>
          <dl>
            <dt>Model</dt>
            <dd>{basis.model}</dd>
            <dt>Formula</dt>
            <dd>{basis.formula}</dd>
            <dt>Source</dt>
            <dd>{basis.source}</dd>
          </dl>
        </details>
        {tdbSeconds !== null && (
          <button type="button" className="link" onClick={() => controller.goTo(tdbSeconds)}>
            go there
          </button>
        )}
        {kind === 'support' && (
          <label className="finding-plate">
            <input
              type="checkbox"
              checked={onPlate}
              onChange={() => controller.togglePlateFinding(id)}
            />
            to the plate
          </label>
        )}
      </div>
    </li>
  );
}
