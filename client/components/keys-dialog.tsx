import { CheckboxField } from './checkbox-field';
import { Dialog } from './dialog';
import { keyName } from './key-match';
import { keysChoice, useListedKeys } from './keys';
import { useStoredChoice } from './use-stored-choice';

/** The keys of the page, and the switch that turns them off. */
export function KeysDialog({ open, onClose }: { open: boolean; onClose: () => void }) {
  const keys = useListedKeys();
  const [choice, setChoice] = useStoredChoice(keysChoice);
  return (
    <Dialog open={open} onClose={onClose} title="Keys of this page">
      <dl className="grid grid-cols-[auto_1fr] items-baseline gap-x-4 gap-y-2">
        {keys.map((binding, index) => (
          <div key={index} className="contents">
            <dt>
              <kbd className="inline-block min-w-8 rounded-sm border border-edge px-1.5 text-center">
                {keyName(binding.key)}
              </kbd>
            </dt>
            <dd>{binding.label}</dd>
          </div>
        ))}
      </dl>
      <CheckboxField
        label="Keys are switched on"
        hint="Switch them off when software of yours sends single letters."
        checked={choice === 'on'}
        onChange={(event) => setChoice(event.target.checked ? 'on' : 'off')}
      />
    </Dialog>
  );
}
