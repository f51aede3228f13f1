import { unbroken } from '../figures';

/** Words of caution, set off by a rule and named as what they are. */
export function Caution({ text }: { text: string }) {
  return (
    <p className="caution">
      <span className="caps">Caution</span> {unbroken(text)}
    </p>
  );
}
