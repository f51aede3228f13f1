import type { Report } from '../../../core/report/report';
import { plain, utcWords } from '../figures';

/** What the findings rest on: the model, the span, the assumptions and what is left out. */
export function ModelFold({ report }: { report: Report }) {
  const { model, classical } = report;
  return (
    <section aria-labelledby="model-title" className="findings-section">
      <h3 id="model-title" className="only-spoken">
        Model and assumptions
      </h3>
      <details className="fold model">
        <summary className="caps">Model and assumptions</summary>
        <Listing title="Assumed in the case" items={report.case.asAssumed.map(inWords)} />
        <Listing title="Notes of the reading" items={report.case.asRead.notes} />
        <Listing
          title="Ephemeris"
          items={[model.ephemeris, `Coverage: ${model.ephemerisCoverage}`]}
        />
        <Listing title="Forces" items={model.terms} />
        <Listing
          title="Integrator"
          items={[model.integrator, `Tolerance ${plain(model.tolerance)}`]}
        />
        <Listing
          title="Span of the search"
          items={[
            `${utcWords(model.span.fromUtc)} to ${utcWords(model.span.toUtc)} UTC`,
            model.span.rule,
            ...(model.trajectoryEnds === null ? [] : [model.trajectoryEnds]),
          ]}
        />
        <Listing title="Time" items={model.timeAssumptions} />
        <Listing title="Not modelled" items={model.notModelled} />
        {classical !== null && <Listing title="Two-body chain" items={[classical.method]} />}
        <section aria-labelledby="gm-title">
          <h4 id="gm-title">Gravitational parameters, set {model.gmSet}</h4>
          <dl className="finding-figures">
            {model.bodies.map(({ body, gmKm3S2 }) => (
              <div key={body}>
                <dt>{body}</dt>
                <dd className="figures">
                  {plain(gmKm3S2)} km<sup>3</sup>/s<sup>2</sup>
                </dd>
              </div>
            ))}
          </dl>
        </section>
        <section aria-labelledby="fingerprint-title">
          <h4 id="fingerprint-title">Fingerprint of the report</h4>
          <p className="figures model-fingerprint">{report.fingerprint}</p>
        </section>
      </details>
    </section>
  );
}

function inWords(item: Report['case']['asAssumed'][number]): string {
  const note = item.note === '' ? '' : `: ${item.note}`;
  return `${item.field} = ${item.value} (${item.origin})${note}`;
}

function Listing({ title, items }: { title: string; items: string[] }) {
  if (items.length === 0) return null;
  return (
    <section>
      <h4>{title}</h4>
      <ul>
        {items.map((item) => (
          <li key={item}>{item}</li>
        ))}
      </ul>
    </section>
  );
}
