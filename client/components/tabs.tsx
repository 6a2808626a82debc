import { useRef, type KeyboardEvent, type ReactNode } from 'react';
import { classNames } from './class-names';
import { formatCount } from './quantities';

export interface Tab<Id extends string> {
  id: Id;
  label: string;
  count?: number;
}

/** A row of tabs; arrow keys, Home and End move between them. Keep `current` in the URL with useUrlChoice. */
export function Tabs<Id extends string>({
  label,
  tabs,
  current,
  onChange,
}: {
  label: string;
  tabs: readonly Tab<Id>[];
  current: Id;
  onChange: (id: Id) => void;
}) {
  const list = useRef<HTMLDivElement>(null);
  const moveTo = (event: KeyboardEvent, index: number) => {
    const tab = tabs[(index + tabs.length) % tabs.length];
    if (tab === undefined) return;
    event.preventDefault();
    onChange(tab.id);
    list.current?.querySelector<HTMLElement>(`[data-tab="${CSS.escape(tab.id)}"]`)?.focus();
  };
  const at = tabs.findIndex((tab) => tab.id === current);
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'ArrowRight') moveTo(event, at + 1);
    else if (event.key === 'ArrowLeft') moveTo(event, at - 1);
    else if (event.key === 'Home') moveTo(event, 0);
    else if (event.key === 'End') moveTo(event, tabs.length - 1);
  };
  return (
    <div
      ref={list}
      role="tablist"
      aria-label={label}
      onKeyDown={onKeyDown}
      className="screen-only flex overflow-x-auto border-b border-rule"
    >
      {tabs.map((tab) => {
        const chosen = tab.id === current;
        return (
          <button
            key={tab.id}
            type="button"
            role="tab"
            id={`tab-${tab.id}`}
            data-tab={tab.id}
            aria-selected={chosen}
            aria-controls={chosen ? `panel-${tab.id}` : undefined}
            tabIndex={chosen ? 0 : -1}
            onClick={() => onChange(tab.id)}
            className={classNames(
              '-mb-px shrink-0 border-b-2 px-3 py-2 whitespace-nowrap -outline-offset-2',
              chosen ? 'border-accent font-bold' : 'border-transparent text-muted hover:text-ink',
            )}
          >
            {tab.label}
            {tab.count !== undefined && <span className="text-muted"> {formatCount(tab.count)}</span>}
          </button>
        );
      })}
    </div>
  );
}

/** The content of the chosen tab; draws nothing for the others. */
export function TabPanel({ id, current, children }: { id: string; current: string; children: ReactNode }) {
  if (id !== current) return null;
  return (
    <div role="tabpanel" id={`panel-${id}`} aria-labelledby={`tab-${id}`} className="grid min-w-0 gap-4 pt-4">
      {children}
    </div>
  );
}
