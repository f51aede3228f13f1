import { useId, useState } from 'react';
import type { Field, FieldName } from '../../../core/case/types';
import { useController } from '../controller-context';

interface Props {
  fields: Field[];
  onSelect(line: number): void;
}

const GROUPS = [
  'Object',
  'Epoch',
  'Centre, axes and units',
  'State',
  'Forces of its own and body',
  'Model and span',
] as const;

/** Under which heading each field stands; every field has its place. */
const GROUP_OF: Record<FieldName, (typeof GROUPS)[number]> = {
  name: 'Object',
  objectId: 'Object',
  epoch: 'Epoch',
  timeScale: 'Epoch',
  centre: 'Centre, axes and units',
  axes: 'Centre, axes and units',
  lengthUnit: 'Centre, axes and units',
  speedUnit: 'Centre, axes and units',
  numberFormat: 'Centre, axes and units',
  x: 'State',
  y: 'State',
  z: 'State',
  vx: 'State',
  vy: 'State',
  vz: 'State',
  semiMajorAxis: 'State',
  periapsisDistance: 'State',
  eccentricity: 'State',
  inclination: 'State',
  node: 'State',
  argumentOfPeriapsis: 'State',
  meanAnomaly: 'State',
  trueAnomaly: 'State',
  periapsisTime: 'State',
  covariance: 'State',
  a1: 'Forces of its own and body',
  a2: 'Forces of its own and body',
  a3: 'Forces of its own and body',
  absoluteMagnitude: 'Forces of its own and body',
  slopeParameter: 'Forces of its own and body',
  diameter: 'Forces of its own and body',
  albedo: 'Forces of its own and body',
  density: 'Forces of its own and body',
  strength: 'Forces of its own and body',
  gm: 'Model and span',
  spanFrom: 'Model and span',
  spanTo: 'Model and span',
};

/** The case as understood: every field with its unit and where it comes from, each editable. */
export function Fields({ fields, onSelect }: Props) {
  if (fields.length === 0) return null;
  const assumed = fields.filter((field) => field.origin === 'assumed').length;
  return (
    <section aria-labelledby="fields-title">
      <h3 id="fields-title" className="caps">
        The case as understood
      </h3>
      <p className="sheet-hint">
        {assumed === 0
          ? 'Nothing is assumed: every field was read or set by hand.'
          : `${assumed} of ${fields.length} fields are assumed (†): the text does not say them.`}
      </p>
      {GROUPS.map((title) => {
        const own = fields.filter((field) => GROUP_OF[field.field] === title);
        if (own.length === 0) return null;
        return (
          <section key={title} className="fields-group" aria-label={title}>
            <h4 className="fields-title">{title}</h4>
            {own.map((field) => (
              <FieldRow key={field.field} field={field} onSelect={onSelect} />
            ))}
          </section>
        );
      })}
    </section>
  );
}

function FieldRow({ field, onSelect }: { field: Field; onSelect(line: number): void }) {
  const controller = useController();
  const id = useId();
  const set = (value: string) => {
    if (value !== field.value) controller.setChoice(field.field, value);
  };
  const described = field.note === null ? `${id}-origin` : `${id}-origin ${id}-note`;
  return (
    <div className={`field field-${field.origin}`}>
      <label htmlFor={id}>{field.label}</label>
      <Origin id={`${id}-origin`} field={field} onSelect={onSelect} />
      <div className="field-value">
        <Value id={id} described={described} field={field} onSet={set} />
        {field.unit !== null && <span className="field-unit">{field.unit}</span>}
      </div>
      {field.note !== null && (
        <p id={`${id}-note`} className="field-note">
          {field.note}
        </p>
      )}
    </div>
  );
}

interface ValueProps {
  id: string;
  described: string;
  field: Field;
  onSet(value: string): void;
}

function Value({ id, described, field, onSet }: ValueProps) {
  // The entries of a covariance are changed in the text; the sheet only names it.
  if (field.field === 'covariance') {
    return (
      <output id={id} className="figures" aria-describedby={described}>
        {field.value}
      </output>
    );
  }
  if (field.options === null) {
    return <TextValue id={id} described={described} value={field.value} onSet={onSet} />;
  }
  return (
    <select
      id={id}
      aria-describedby={described}
      value={field.value}
      onChange={(event) => onSet(event.target.value)}
    >
      {field.options.map((option) => (
        <option key={option.value} value={option.value}>
          {option.label}
        </option>
      ))}
    </select>
  );
}

/** Where the value comes from, in a word and a mark. */
function Origin({ id, field, onSelect }: { id: string; field: Field; onSelect(n: number): void }) {
  const controller = useController();
  const { origin, line } = field;
  if (origin === 'edited') {
    return (
      <span id={id} className="field-origin">
        ‡ edited{' '}
        <button
          type="button"
          className="link"
          aria-label={`Reset ${field.label} to what was read or assumed`}
          onClick={() => controller.setChoice(field.field, null)}
        >
          reset
        </button>
      </span>
    );
  }
  if (origin === 'assumed') {
    return (
      <span id={id} className="field-origin">
        † assumed
      </span>
    );
  }
  return (
    <span id={id} className="field-origin">
      read
      {line !== null && (
        <>
          {', '}
          <button type="button" className="link" onClick={() => onSelect(line)}>
            line {line}
          </button>
        </>
      )}
    </span>
  );
}

interface TextValueProps {
  id: string;
  described: string;
  value: string;
  onSet(value: string): void;
}

/** A text that is set when the person leaves it or presses Enter; Escape gives it back. */
function TextValue({ id, described, value, onSet }: TextValueProps) {
  const [draft, setDraft] = useState<string | null>(null);
  const commit = () => {
    if (draft !== null) onSet(draft.trim());
    setDraft(null);
  };
  return (
    <input
      id={id}
      className="figures"
      type="text"
      aria-describedby={described}
      spellCheck={false}
      autoComplete="off"
      value={draft ?? value}
      onChange={(event) => setDraft(event.target.value)}
      onBlur={commit}
      onKeyDown={(event) => {
        if (event.key === 'Enter') commit();
        if (event.key === 'Escape') setDraft(null);
      }}
    />
  );
}
