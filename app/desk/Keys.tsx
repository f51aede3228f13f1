import { useEffect, useState } from 'react';
import { jumpToEvent, togglePlaying } from '../ribbon/transport';
import { type DeskContext, useDesk } from '../store/context';

const KEYS: { keys: string[]; does: string }[] = [
  { keys: ['Space'], does: 'play or pause' },
  { keys: ['['], does: 'to the event before' },
  { keys: [']'], does: 'to the event after' },
];

/** The keys that work anywhere on the page, and the switch that turns them off. */
export function Keys() {
  const desk = useDesk();
  const [on, setOn] = useState(true);

  useEffect(() => {
    if (!on) return;
    const press = (event: KeyboardEvent) => {
      if (handle(event, desk)) event.preventDefault();
    };
    addEventListener('keydown', press);
    return () => removeEventListener('keydown', press);
  }, [on, desk]);

  return (
    <details
      className="keys fold"
      onKeyDown={(event) => {
        if (event.key === 'Escape') event.currentTarget.open = false;
      }}
      onBlur={(event) => {
        if (!event.currentTarget.contains(event.relatedTarget)) event.currentTarget.open = false;
      }}
    >
      <summary>Keys</summary>
      <div className="keys-sheet">
        <dl>
          {KEYS.map(({ keys, does }) => (
            <KeyRow key={does} keys={keys} does={does} />
          ))}
          <KeyRow keys={['Tab']} does="from part to part" />
          <KeyRow keys={['←', '→']} does="along the ribbon, when it has the focus" />
          <KeyRow keys={['Ctrl V']} does="outside a field: paste a new case" />
        </dl>
        <label className="keys-switch">
          <input type="checkbox" checked={on} onChange={(event) => setOn(event.target.checked)} />
          Space, [ and ] work anywhere
        </label>
      </div>
    </details>
  );
}

function KeyRow({ keys, does }: { keys: string[]; does: string }) {
  return (
    <>
      <dt>
        {keys.map((key) => (
          <kbd key={key}>{key}</kbd>
        ))}
      </dt>
      <dd>{does}</dd>
    </>
  );
}

const TYPING = 'input:not([type="checkbox"], [type="radio"]), textarea, select';
/** Elements that Space belongs to. */
const PRESSED_BY_SPACE = `${TYPING}, input, button, summary, a`;

function handle(event: KeyboardEvent, desk: DeskContext): boolean {
  if (event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey) return false;
  const inside = (selector: string) =>
    event.target instanceof Element && event.target.closest(selector) !== null;
  if (event.key === ' ' && !inside(PRESSED_BY_SPACE)) togglePlaying(desk);
  else if (event.key === '[' && !inside(TYPING)) jumpToEvent(desk, -1);
  else if (event.key === ']' && !inside(TYPING)) jumpToEvent(desk, 1);
  else return false;
  return true;
}
