import type { Question } from '../../../core/case/types';
import { useController } from '../controller-context';

interface Props {
  questions: Question[];
  onSelect(line: number): void;
}

/** Where two readings are possible: both, as buttons. */
export function Questions({ questions, onSelect }: Props) {
  const controller = useController();
  if (questions.length === 0) return null;
  return (
    <section aria-labelledby="questions-title">
      <h3 id="questions-title" className="caps">
        To be answered
      </h3>
      {questions.map(({ field, line, message, readings }) => (
        <fieldset key={field} className="question">
          <legend>{message}</legend>
          {line !== null && (
            <button type="button" className="link" onClick={() => onSelect(line)}>
              line {line}
            </button>
          )}
          {readings.map((reading) => (
            <button
              key={reading.value}
              type="button"
              className="button"
              onClick={() => controller.setChoice(field, reading.value)}
            >
              {reading.label}
            </button>
          ))}
        </fieldset>
      ))}
    </section>
  );
}
