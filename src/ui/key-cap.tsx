const words: Record<string, string> = { Escape: 'Esc', ArrowUp: 'up', ArrowDown: 'down' };

/** Keys as drawn on a keyboard; "g w" is two caps. Hidden from readers of the screen: the key line and its list say it. */
export function KeyCap({ keys }: { keys: string }) {
  return (
    <span className="inline-flex gap-1" aria-hidden="true">
      {keys.split(/[ +]/).map((key) => (
        <span
          key={key}
          className="inline-flex h-[18px] min-w-[18px] items-center justify-center rounded-[3px] border border-current px-1 text-[11px] leading-none font-[650]"
        >
          {key === 'Enter' ? <EnterGlyph /> : (words[key] ?? (key.length === 1 ? key.toUpperCase() : key))}
        </span>
      ))}
    </span>
  );
}

function EnterGlyph() {
  return (
    <svg viewBox="0 0 16 16" width="13" height="13" fill="none" stroke="currentColor" strokeWidth="1.6">
      <path d="M13.5 3.5v5.5H3M6 5.8 2.8 9 6 12.2" />
    </svg>
  );
}
