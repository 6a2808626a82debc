/** One key of a page. */
export interface KeyBinding {
  /** 's', 'Shift+A', 'ArrowDown', 'Enter', 'Ctrl+z' (Ctrl also stands for ⌘), '/', '?'. */
  key: string;
  /** What it does, as the list of keys says it. */
  label: string;
  action: (event: KeyboardEvent) => void;
}

export interface KeyPress {
  key: string;
  ctrlKey: boolean;
  metaKey: boolean;
  altKey: boolean;
  shiftKey: boolean;
}

/** True when a press is the key that a binding names. Signs that need Shift on some keyboards ('?') match by sign. */
export function keyMatches(name: string, press: KeyPress): boolean {
  const parts = name === '+' ? ['+'] : name.split('+');
  const wanted = parts.at(-1) ?? '';
  const modifiers = parts.slice(0, -1).map((part) => part.toLowerCase());
  const ctrl = press.ctrlKey || press.metaKey;
  if (press.altKey || ctrl !== modifiers.includes('ctrl')) return false;
  if (/^\p{L}$/u.test(wanted)) {
    return press.key.toLowerCase() === wanted.toLowerCase() && press.shiftKey === modifiers.includes('shift');
  }
  if (press.key !== wanted) return false;
  return wanted.length === 1 || press.shiftKey === modifiers.includes('shift');
}

/** The binding that a press means; of several with the same key the one registered last. */
export function bindingFor(bindings: readonly KeyBinding[], press: KeyPress): KeyBinding | null {
  return bindings.findLast((binding) => keyMatches(binding.key, press)) ?? null;
}

const TEXT_INPUTS = new Set(['checkbox', 'radio', 'button', 'submit', 'reset', 'file', 'range', 'color']);

/** True where a letter is typed and not a key of the page. */
export function takesText(tag: string, type: string | null, editable: boolean): boolean {
  if (editable) return true;
  const name = tag.toLowerCase();
  if (name === 'textarea' || name === 'select') return true;
  return name === 'input' && !TEXT_INPUTS.has((type ?? 'text').toLowerCase());
}

/** True where Enter and the space bar already press something. */
export function pressesItself(tag: string, role: string | null): boolean {
  const name = tag.toLowerCase();
  return name === 'button' || name === 'a' || name === 'summary' || name === 'input' || role === 'slider';
}

const SIGNS: Readonly<Record<string, string>> = {
  ArrowUp: '↑',
  ArrowDown: '↓',
  ArrowLeft: '←',
  ArrowRight: '→',
  ' ': 'Space',
};

/** A key as the list of keys writes it: 'Shift A', '↓'. */
export function keyName(key: string): string {
  if (key === '+') return '+';
  return key
    .split('+')
    .map((part) => SIGNS[part] ?? (part.length === 1 ? part.toUpperCase() : part))
    .join(' ');
}
