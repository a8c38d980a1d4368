import { useEffect, useRef, useSyncExternalStore } from 'react';
import { keepChoice, keptChoice, useKeptChoice } from '#src/lib/kept.ts';

/** `keys`: one key ("j", "Enter", "Escape", "?"), two after each other ("g w"), or with control ("Control+Enter"). */
export interface KeyBinding {
  readonly keys: string;
  readonly label: string;
  readonly run: () => void;
  /** Not printed in the key line: it stands elsewhere or is the same deed as another key. */
  readonly quiet?: boolean;
}

const switchKey = 'fringeward.single-keys';
let active: readonly (readonly KeyBinding[])[] = [];
let line: readonly KeyBinding[] = [];
const listeners = new Set<() => void>();
let prefix = '';
let prefixTimer: ReturnType<typeof setTimeout> | undefined;

function publish(next: typeof active): void {
  active = next;
  line = active.flat();
  for (const listener of listeners) listener();
}

function isTyping(target: EventTarget | null): boolean {
  if (!(target instanceof HTMLElement)) return false;
  if (target.isContentEditable || target instanceof HTMLTextAreaElement) return true;
  if (target instanceof HTMLSelectElement) return true;
  return target instanceof HTMLInputElement && !['checkbox', 'radio', 'button'].includes(target.type);
}

/** Enter on a control is that control's own. */
function ownsEnter(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && target.closest('a,button,summary,input,select') !== null;
}

function pressed(event: KeyboardEvent): string {
  return (event.ctrlKey || event.metaKey ? 'Control+' : '') + event.key;
}

function find(keys: string): KeyBinding | undefined {
  return [...active]
    .reverse()
    .flat()
    .find((b) => b.keys === keys);
}

function handleKey(event: KeyboardEvent): void {
  if (event.defaultPrevented || event.altKey || event.isComposing) return;
  if (document.querySelector('dialog[open]') && !(event.target as Element | null)?.closest?.('dialog'))
    return;
  const key = pressed(event);
  const single = event.key.length === 1 && !key.startsWith('Control+');
  if (single && (isTyping(event.target) || keptChoice(switchKey) === 'off')) return;
  if (key === 'Enter' && (isTyping(event.target) || ownsEnter(event.target))) return;
  const binding = find(prefix ? `${prefix} ${key}` : key);
  clearTimeout(prefixTimer);
  const starts = !prefix && single && active.flat().some((b) => b.keys.startsWith(`${key} `));
  prefix = !binding && starts ? key : '';
  if (prefix) prefixTimer = setTimeout(() => (prefix = ''), 1500);
  if (!binding) return;
  event.preventDefault();
  binding.run();
}

/** The keys that apply while the component is mounted; those of the innermost component win. Off while typing. */
export function useKeys(bindings: readonly KeyBinding[]): void {
  const latest = useRef(bindings);
  useEffect(() => {
    latest.current = bindings;
  });
  const signature = bindings.map((b) => `${b.keys}\n${b.label}\n${b.quiet ?? false}`).join('\n');
  useEffect(() => {
    const mine = latest.current.map((b, i) => ({ ...b, run: () => latest.current[i]?.run() }));
    if (active.length === 0) document.addEventListener('keydown', handleKey);
    publish([...active, mine]);
    return () => {
      publish(active.filter((set) => set !== mine));
      if (active.length === 0) document.removeEventListener('keydown', handleKey);
    };
  }, [signature]);
}

/** Every key that applies now, for the key line. */
export function useActiveKeys(): readonly KeyBinding[] {
  return useSyncExternalStore(
    (changed) => {
      listeners.add(changed);
      return () => listeners.delete(changed);
    },
    () => line,
  );
}

export function useSingleKeys(): { on: boolean; set: (on: boolean) => void } {
  const kept = useKeptChoice(switchKey);
  return { on: kept !== 'off', set: (on) => keepChoice(switchKey, on ? 'on' : 'off') };
}
