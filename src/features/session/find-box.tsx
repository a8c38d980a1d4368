import { useState, type Ref } from 'react';
import { useNavigate, useSearchParams } from 'react-router-dom';
import { KeyCap } from '#src/ui/key-cap.tsx';

/** Finds a case by number, title, part, lot or specimen: the work list shows what is found. */
export function FindBox({ ref }: { ref: Ref<HTMLInputElement> }) {
  const navigate = useNavigate();
  const [search] = useSearchParams();
  const asked = search.get('q') ?? '';
  const [text, setText] = useState({ asked, typed: asked });
  if (text.asked !== asked) setText({ asked, typed: asked });
  return (
    <form
      role="search"
      className="flex h-[31px] w-full items-center gap-2 rounded-full border border-edge bg-raised px-3 has-focus-visible:outline-3 has-focus-visible:outline-offset-2 has-focus-visible:outline-ink lg:w-[210px]"
      onSubmit={(event) => {
        event.preventDefault();
        const q = text.typed.trim();
        void navigate(q ? `/?q=${encodeURIComponent(q)}` : '/');
      }}
    >
      <FindGlyph />
      <input
        ref={ref}
        type="search"
        aria-label="Find a case"
        placeholder="Case, part or lot"
        value={text.typed}
        maxLength={100}
        onChange={(event) => setText({ asked, typed: event.target.value })}
        onKeyDown={(event) => {
          if (event.key === 'Escape') event.currentTarget.blur();
        }}
        className="w-full min-w-0 bg-transparent outline-none [&::-webkit-search-cancel-button]:hidden"
      />
      <span className="text-ink3 max-lg:hidden">
        <KeyCap keys="/" />
      </span>
    </form>
  );
}

export function FindGlyph() {
  return (
    <svg
      viewBox="0 0 16 16"
      width="14"
      height="14"
      aria-hidden="true"
      fill="none"
      stroke="currentColor"
      strokeWidth="1.6"
      className="shrink-0 text-ink2"
    >
      <circle cx="6.6" cy="6.6" r="4.8" />
      <path d="m10.2 10.2 4.4 4.4" />
    </svg>
  );
}
