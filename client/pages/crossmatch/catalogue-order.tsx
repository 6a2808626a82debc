import type { CatalogueSummary } from '../../../shared/schemas/catalogue';
import { Button } from '../../components/button';
import { formatCount } from '../../components/quantities';
import { Stamp } from '../../components/stamp';
import { movedItem } from '../../components/radius-advice';
import { epochText } from '../../components/run-words';

const MOST_CHOSEN = 12;

/** Chosen catalogues in their order, and the others to choose from. */
export function CatalogueOrder({
  ready,
  chosen,
  onChange,
  error,
}: {
  ready: readonly CatalogueSummary[];
  chosen: readonly string[];
  onChange: (labels: string[]) => void;
  error: string | undefined;
}) {
  const known = new Map(ready.map((catalogue) => [catalogue.label, catalogue]));
  const others = ready.filter(({ label }) => !chosen.includes(label));
  return (
    <div
      className="grid gap-4"
      role="group"
      aria-describedby={error === undefined ? undefined : 'order-error'}
    >
      {chosen.length > 0 && (
        <ol className="grid gap-1" aria-label="Chosen, in order">
          {chosen.map((label, index) => {
            const catalogue = known.get(label);
            return catalogue === undefined ? null : (
              <li
                key={label}
                className="grid grid-cols-[2rem_minmax(0,1fr)_auto] items-center gap-2 border border-edge bg-raised px-3 py-1.5"
              >
                <span className="text-lg font-bold text-accent">{sideLetter(index)}</span>
                <CatalogueLine catalogue={catalogue} />
                <span className="flex gap-1">
                  <Button
                    size="sm"
                    kind="quiet"
                    disabled={index === 0}
                    aria-label={`Move ${label} up`}
                    onClick={() => onChange(movedItem(chosen, index, -1))}
                  >
                    ↑
                  </Button>
                  <Button
                    size="sm"
                    kind="quiet"
                    disabled={index === chosen.length - 1}
                    aria-label={`Move ${label} down`}
                    onClick={() => onChange(movedItem(chosen, index, 1))}
                  >
                    ↓
                  </Button>
                  <Button
                    size="sm"
                    kind="quiet"
                    aria-label={`Take ${label} out`}
                    onClick={() => onChange(chosen.filter((one) => one !== label))}
                  >
                    ✕
                  </Button>
                </span>
              </li>
            );
          })}
        </ol>
      )}
      {others.length > 0 && (
        <ul className="grid gap-1" aria-label="Not chosen">
          {others.map((catalogue) => (
            <li
              key={catalogue.label}
              className="grid grid-cols-[minmax(0,1fr)_auto] items-center gap-2 border border-dashed border-edge px-3 py-1.5"
            >
              <CatalogueLine catalogue={catalogue} />
              <Button
                size="sm"
                disabled={chosen.length >= MOST_CHOSEN}
                aria-label={`Choose ${catalogue.label}`}
                onClick={() => onChange([...chosen, catalogue.label])}
              >
                Choose
              </Button>
            </li>
          ))}
        </ul>
      )}
      {error !== undefined && (
        <p id="order-error" role="alert" className="text-xs text-bad">
          <span aria-hidden="true">✕ </span>
          {error}
        </p>
      )}
    </div>
  );
}

/** A, B, C …: the sides of a cross-match. */
function sideLetter(index: number): string {
  return String.fromCharCode(65 + index);
}

function CatalogueLine({ catalogue }: { catalogue: CatalogueSummary }) {
  return (
    <span className="flex min-w-0 flex-wrap items-center gap-x-4 gap-y-0.5">
      <span className="flex items-center font-medium">
        <Stamp catalogue={catalogue} withLabel />
      </span>
      <span className="min-w-0 text-muted">{catalogue.title}</span>
      <span className="whitespace-nowrap text-muted">{formatCount(catalogue.sources)} sources</span>
      <span className="whitespace-nowrap text-muted">epoch {epochText(catalogue.epochYear)}</span>
    </span>
  );
}
