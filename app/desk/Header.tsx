import { useDesk, useDeskStore } from '../store/context';
import type { Theme } from '../store/store';
import { Keys } from './Keys';
import { RunLine } from './RunLine';

const THEMES: { value: Theme; word: string }[] = [
  { value: 'auto', word: 'Auto' },
  { value: 'paper', word: 'Paper' },
  { value: 'night', word: 'Night' },
];

export function Header() {
  return (
    <header className="head">
      <h1 className="head-title">Skimline</h1>
      <RunLine />
      <p className="head-promise">Nothing leaves this machine.</p>
      <Keys />
      <ThemeSwitch />
    </header>
  );
}

function ThemeSwitch() {
  const { store } = useDesk();
  const theme = useDeskStore((state) => state.theme);
  return (
    <fieldset className="choice">
      <legend className="only-spoken">Paper or night</legend>
      {THEMES.map(({ value, word }) => (
        <label key={value}>
          <input
            type="radio"
            name="theme"
            value={value}
            checked={theme === value}
            onChange={() => store.setState({ theme: value })}
          />
          {word}
        </label>
      ))}
    </fieldset>
  );
}
