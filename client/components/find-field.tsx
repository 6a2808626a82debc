import { useId, useRef, useState, type KeyboardEvent } from 'react';
import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useNavigate, useSearchParams } from 'react-router-dom';
import { findAnswer } from '../../shared/schemas/find';
import { keys } from '../api/query-keys';
import { groupPath, request } from '../api/request';
import { classNames } from './class-names';
import { findSuggestions, type FindSuggestion } from './find-suggestions';
import { useKeys } from './keys';
import { useDebounced } from './use-debounced';

const WAIT_MS = 150;
const SHOWN = 8;

/** The find field of the top bar: a name, a position or an object number; '/' puts the cursor in it. */
export function FindField({ group }: { group: string }) {
  const [search] = useSearchParams();
  const asked = search.get('q') ?? '';
  // A new question in the address (a link, the back button) takes the place of what was typed before.
  return <FindBox key={`${group} ${asked}`} group={group} asked={asked} />;
}

function FindBox({ group, asked }: { group: string; asked: string }) {
  const [text, setText] = useState(asked);
  const [open, setOpen] = useState(false);
  const [chosen, setChosen] = useState(-1);
  const input = useRef<HTMLInputElement>(null);
  const listId = useId();
  const navigate = useNavigate();
  useKeys([{ key: '/', label: 'Go to the find field', action: () => input.current?.select() }]);
  const suggestions = useSuggestions(group, text, open);
  const shown = open && suggestions.length > 0;

  const go = (address: string) => {
    setOpen(false);
    input.current?.blur();
    void navigate(address);
  };
  const openObject = (number: number) => {
    setText('');
    go(`/g/${group}/objects/${number}`);
  };
  const submit = () => {
    const suggestion = shown ? suggestions[chosen] : undefined;
    if (suggestion !== undefined) openObject(suggestion.number);
    else if (text.trim() !== '') go(`/g/${group}/find?q=${encodeURIComponent(text.trim())}`);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'Escape') {
      if (!open) input.current?.blur();
      setOpen(false);
      setChosen(-1);
    } else if (shown && (event.key === 'ArrowDown' || event.key === 'ArrowUp')) {
      event.preventDefault();
      const step = event.key === 'ArrowDown' ? 1 : -1;
      // One place more than suggestions: -1 is the typed text itself.
      setChosen(((chosen + 1 + step + suggestions.length + 1) % (suggestions.length + 1)) - 1);
    }
  };
  return (
    <form
      role="search"
      className="relative min-w-0 flex-1"
      onSubmit={(event) => {
        event.preventDefault();
        submit();
      }}
      onBlur={(event) => {
        if (!event.currentTarget.contains(event.relatedTarget)) setOpen(false);
      }}
    >
      <input
        ref={input}
        type="search"
        role="combobox"
        aria-label="Find a name, position or number"
        aria-expanded={shown}
        aria-controls={shown ? listId : undefined}
        aria-autocomplete="list"
        aria-activedescendant={shown && chosen >= 0 ? `${listId}-${chosen}` : undefined}
        placeholder="Name, position or number"
        autoComplete="off"
        autoCapitalize="off"
        spellCheck={false}
        value={text}
        onChange={(event) => {
          setText(event.target.value);
          setOpen(true);
          setChosen(-1);
        }}
        onFocus={() => setOpen(true)}
        onKeyDown={onKeyDown}
        className="min-h-9 w-full rounded-sm border border-edge bg-raised px-3 placeholder:text-muted hover:border-ink"
      />
      {shown && <Suggestions id={listId} suggestions={suggestions} chosen={chosen} onChoose={openObject} />}
    </form>
  );
}

function useSuggestions(group: string, text: string, open: boolean): FindSuggestion[] {
  const q = useDebounced(text.trim(), WAIT_MS);
  const { data } = useQuery({
    queryKey: [...keys.find(group, q), 'suggestions'],
    enabled: open && q.length >= 2,
    queryFn: ({ signal }) =>
      request({ path: groupPath(group, 'find'), query: { q, limit: SHOWN }, answer: findAnswer, signal }),
    placeholderData: keepPreviousData,
    staleTime: 30_000,
    retry: false,
  });
  return data === undefined || text.trim().length < 2 ? [] : findSuggestions(data, SHOWN);
}

function Suggestions({
  id,
  suggestions,
  chosen,
  onChoose,
}: {
  id: string;
  suggestions: readonly FindSuggestion[];
  chosen: number;
  onChoose: (number: number) => void;
}) {
  return (
    <ul
      id={id}
      role="listbox"
      aria-label="Suggestions"
      className="absolute top-full z-40 mt-1 w-full min-w-72 border border-edge bg-raised"
    >
      {suggestions.map((one, index) => (
        <li
          key={`${one.number} ${one.text}`}
          id={`${id}-${index}`}
          role="option"
          aria-selected={index === chosen}
          onPointerDown={(event) => {
            event.preventDefault();
            onChoose(one.number);
          }}
          className={classNames(
            'flex cursor-pointer flex-wrap items-baseline justify-between gap-x-3 border-l-3 px-3 py-1.5 hover:bg-sunken',
            index === chosen ? 'border-accent bg-sunken' : 'border-transparent',
          )}
        >
          <span className="min-w-0 truncate">{one.text}</span>
          <span className="shrink-0 text-xs text-muted">{one.remark}</span>
        </li>
      ))}
    </ul>
  );
}
