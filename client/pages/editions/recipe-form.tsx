import type { ExportOptions, ExportRecipe } from '../../../shared/schemas/export';
import { Button } from '../../components/button';
import { CheckboxField } from '../../components/checkbox-field';
import { SelectField } from '../../components/select-field';
import { Stamp } from '../../components/stamp';

const MOST_ENTRIES = 6;

/** Which columns the table has and which objects stand in it. */
export function RecipeForm({
  options,
  recipe,
  onChange,
}: {
  options: ExportOptions;
  recipe: ExportRecipe;
  onChange: (recipe: ExportRecipe) => void;
}) {
  const change = (part: Partial<ExportRecipe>) => onChange({ ...recipe, ...part });
  return (
    <div className="grid gap-6">
      <div className="grid gap-4 sm:grid-cols-3">
        <SelectField
          label="Names"
          value={recipe.aliases}
          options={[
            { value: 'one-cell', label: 'all in one cell' },
            { value: 'per-catalogue', label: 'one column per catalogue' },
          ]}
          onChange={(event) => change({ aliases: event.target.value === 'one-cell' ? 'one-cell' : 'per-catalogue' })}
        />
        <SelectField
          label="Position"
          value={recipe.position}
          options={[
            { value: 'degrees', label: 'degrees' },
            { value: 'sexagesimal', label: 'sexagesimal' },
            { value: 'both', label: 'both' },
          ]}
          onChange={(event) => {
            const { value } = event.target;
            change({ position: value === 'both' || value === 'sexagesimal' ? value : 'degrees' });
          }}
        />
        <SelectField
          label="Objects with at least"
          value={String(recipe.minEntries)}
          options={Array.from({ length: MOST_ENTRIES }, (_, i) => ({
            value: String(i + 1),
            label: i === 0 ? '1 source (all)' : `${i + 1} sources`,
          }))}
          onChange={(event) => change({ minEntries: Number(event.target.value) })}
        />
      </div>
      <div className="grid gap-2 sm:grid-cols-2">
        <CheckboxField
          label="Separation of each source from the object, arcsec"
          checked={recipe.separations}
          onChange={(event) => change({ separations: event.target.checked })}
        />
        <CheckboxField
          label="Lowest grade and number of verdicts"
          checked={recipe.grades}
          onChange={(event) => change({ grades: event.target.checked })}
        />
      </div>
      <div className="grid gap-4">
        {options.catalogues.map((catalogue) => (
          <CatalogueColumns key={catalogue.label} catalogue={catalogue} recipe={recipe} onChange={onChange} />
        ))}
      </div>
    </div>
  );
}

function CatalogueColumns({
  catalogue,
  recipe,
  onChange,
}: {
  catalogue: ExportOptions['catalogues'][number];
  recipe: ExportRecipe;
  onChange: (recipe: ExportRecipe) => void;
}) {
  const { label, columns } = catalogue;
  const chosen = recipe.catalogues.find((one) => one.label === label)?.columns ?? [];
  const choose = (indexes: readonly number[]) => {
    const others = recipe.catalogues.filter((one) => one.label !== label);
    onChange({
      ...recipe,
      catalogues: [...others, { label, columns: [...indexes].sort((a, b) => a - b) }],
    });
  };
  const required = recipe.standingIn.includes(label);
  return (
    <fieldset className="rounded-sm border border-rule p-3">
      <legend className="flex items-center gap-2 px-1 font-medium">
        <Stamp catalogue={catalogue} />
        {label} <span className="font-normal text-muted">{catalogue.title}</span>
      </legend>
      <div className="mb-2 flex flex-wrap items-center gap-x-4 gap-y-2">
        <CheckboxField
          label="only objects that stand in it"
          checked={required}
          onChange={() =>
            onChange({
              ...recipe,
              standingIn: required
                ? recipe.standingIn.filter((one) => one !== label)
                : [...recipe.standingIn, label],
            })
          }
        />
        <Button size="sm" onClick={() => choose(columns.map((column) => column.index))}>
          All columns<span className="sr-only"> of {label}</span>
        </Button>
        <Button size="sm" onClick={() => choose([])}>
          None<span className="sr-only"> of {label}</span>
        </Button>
      </div>
      <div className="grid gap-x-4 gap-y-1 sm:grid-cols-3 wide:grid-cols-4">
        {columns.map((column) => (
          <CheckboxField
            key={column.index}
            label={column.name === '' ? `column ${column.index + 1}` : column.name}
            checked={chosen.includes(column.index)}
            onChange={(event) =>
              choose(event.target.checked ? [...chosen, column.index] : chosen.filter((one) => one !== column.index))
            }
          />
        ))}
      </div>
    </fieldset>
  );
}
