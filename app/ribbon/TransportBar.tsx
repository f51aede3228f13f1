import { useDesk, useDeskStore } from '../store/context';
import type { RibbonTime } from '../store/store';
import { EventMenu } from './EventMenu';
import type { RibbonGeometry } from './geometry';
import type { Pace } from './pace';
import { PaceReadOut, ReadOut } from './ReadOut';
import { BUTTON_STEP } from './slider-keys';
import { jumpToEvent, togglePlaying } from './transport';

const PACE_WORDS: { value: Pace; word: string }[] = [
  { value: 'slow', word: 'Slow' },
  { value: 'normal', word: 'Normal' },
  { value: 'fast', word: 'Fast' },
];

const TIME_WORDS: { value: RibbonTime; word: string }[] = [
  { value: 'stretched', word: 'Stretched' },
  { value: 'linear', word: 'Linear' },
];

/** Icons of the transport, drawn in a square of 16. */
const ICONS = {
  eventBefore: 'M3 3v10M13 3L5.5 8l7.5 5Z',
  back: 'M11.5 3L4 8l7.5 5Z',
  play: 'M4 2.5L13 8l-9 5.5Z',
  pause: 'M4.5 3h2.5v10h-2.5ZM9 3h2.5v10h-2.5Z',
  on: 'M4.5 3L12 8l-7.5 5Z',
  eventAfter: 'M13 3v10M3 3l7.5 5L3 13Z',
};

/** Play and its pace, steps, events, the time scale, and the read-out. */
export function TransportBar(props: {
  geometry: RibbonGeometry;
  pace: Pace;
  setPace(pace: Pace): void;
}) {
  const { geometry, pace, setPace } = props;
  const desk = useDesk();
  const playing = useDeskStore((state) => state.playing);
  const kind = useDeskStore((state) => state.ribbonTime);

  function step(direction: 1 | -1): void {
    const { time } = geometry;
    const unit = time.unitAt(desk.clock.tdbSeconds) + direction * BUTTON_STEP;
    desk.store.setState({ playing: false });
    desk.clock.set(time.timeAt(Math.min(1, Math.max(0, unit))));
  }

  return (
    <div className="ribbon-bar">
      <div className="ribbon-buttons">
        <IconButton
          words="To the event before"
          icon={ICONS.eventBefore}
          press={() => jumpToEvent(desk, -1)}
        />
        <IconButton words="A step back" icon={ICONS.back} press={() => step(-1)} />
        <IconButton
          words={playing ? 'Pause' : 'Play'}
          icon={playing ? ICONS.pause : ICONS.play}
          press={() => togglePlaying(desk)}
        />
        <IconButton words="A step on" icon={ICONS.on} press={() => step(1)} />
        <IconButton
          words="To the event after"
          icon={ICONS.eventAfter}
          press={() => jumpToEvent(desk, 1)}
        />
      </div>
      <EventMenu />
      <Choice
        legend="Pace of play"
        name="pace"
        options={PACE_WORDS}
        value={pace}
        choose={setPace}
      />
      <PaceReadOut geometry={geometry} pace={pace} />
      <Choice
        legend="Time along the ribbon"
        name="ribbon-time"
        options={TIME_WORDS}
        value={kind}
        choose={(ribbonTime) => desk.store.setState({ ribbonTime })}
      />
      <ReadOut geometry={geometry} />
    </div>
  );
}

function IconButton({ words, icon, press }: { words: string; icon: string; press(): void }) {
  return (
    <button
      type="button"
      className="button ribbon-icon"
      aria-label={words}
      title={words}
      onClick={press}
    >
      <svg width={16} height={16} aria-hidden="true" focusable="false">
        <path d={icon} />
      </svg>
    </button>
  );
}

function Choice<T extends string>(props: {
  legend: string;
  name: string;
  options: { value: T; word: string }[];
  value: T;
  choose(value: T): void;
}) {
  return (
    <fieldset className="choice ribbon-choice">
      <legend className="only-spoken">{props.legend}</legend>
      {props.options.map(({ value, word }) => (
        <label key={value}>
          <input
            type="radio"
            name={props.name}
            checked={props.value === value}
            onChange={() => props.choose(value)}
          />
          {word}
        </label>
      ))}
    </fieldset>
  );
}
