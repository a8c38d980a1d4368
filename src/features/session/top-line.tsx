import { useRef, useState } from 'react';
import { Link, useLocation, useNavigate } from 'react-router-dom';
import { useKeys } from '#src/lib/keys.ts';
import type { SignedInPerson } from '#src/lib/session.ts';
import { chooseTheme, useTheme } from '#src/lib/theme.ts';
import { classNames } from '#src/ui/class-names.ts';
import { Mark } from '#src/ui/mark.tsx';
import { FindBox, FindGlyph } from '#src/features/session/find-box.tsx';
import { PersonMenu } from '#src/features/session/person-menu.tsx';
import { ThemeSwitch } from '#src/features/session/theme-switch.tsx';
import type { Permission } from '#shared/permissions.ts';

const places: readonly { to: string; label: string; needs: Permission; key?: string }[] = [
  { to: '/', label: 'Work list', needs: 'read-cases', key: 'w' },
  { to: '/reviews', label: 'Review', needs: 'read-matches', key: 'r' },
  { to: '/library', label: 'Library', needs: 'read-references', key: 'l' },
  { to: '/benches', label: 'Benches', needs: 'read-benches', key: 'b' },
  { to: '/people', label: 'People', needs: 'manage-people' },
  { to: '/mail', label: 'Mail', needs: 'read-mail' },
  { to: '/audit', label: 'Audit trail', needs: 'read-audit' },
];

/** Cases and exposures belong to the work list. */
function isAt(place: string, pathname: string): boolean {
  return place === '/' ? /^\/($|cases|exposures)/.test(pathname) : pathname.startsWith(place);
}

interface TopLineProps {
  person: SignedInPerson;
  /** What waits, by the address of its place. */
  counts: Readonly<Record<string, number>>;
}

export function TopLine({ person, counts }: TopLineProps) {
  const navigate = useNavigate();
  const { pathname } = useLocation();
  const theme = useTheme();
  const wideFind = useRef<HTMLInputElement>(null);
  const narrowFind = useRef<HTMLInputElement>(null);
  const [finding, setFinding] = useState(false);
  const open = places.filter((p) => person.permissions.includes(p.needs));
  const startFinding = () => {
    if (wideFind.current?.checkVisibility()) return wideFind.current.focus();
    setFinding(true);
    requestAnimationFrame(() => narrowFind.current?.focus());
  };
  useKeys([
    ...open.flatMap((p) =>
      p.key
        ? [{ keys: `g ${p.key}`, label: p.label.toLowerCase(), quiet: true, run: () => void navigate(p.to) }]
        : [],
    ),
    { keys: '/', label: 'find', run: startFinding },
    {
      keys: 't',
      label: 'daylight or darkroom',
      quiet: true,
      run: () => chooseTheme(theme === 'darkroom' ? 'daylight' : 'darkroom'),
    },
  ]);
  return (
    <header className="page-margin flex min-h-[52px] flex-wrap items-center gap-x-6 border-b border-rule">
      <Link to="/" className="flex min-h-[51px] items-center gap-2.5 text-[15px] font-[760] lg:mr-6">
        <Mark /> Fringeward
      </Link>
      <nav
        aria-label="Places"
        className="flex flex-wrap gap-x-6 max-md:order-last max-md:w-full max-md:gap-x-5"
      >
        {open.map((p) => (
          <Link
            key={p.to}
            to={p.to}
            aria-current={isAt(p.to, pathname) ? 'page' : undefined}
            className={classNames(
              'flex min-h-[51px] items-center gap-1.5 border-t-3 border-b-3 border-t-transparent font-[650] max-md:min-h-9',
              isAt(p.to, pathname)
                ? 'border-b-seam text-ink'
                : 'border-b-transparent text-ink2 hover:text-ink',
            )}
          >
            {p.label}
            {counts[p.to] ? (
              <span className="font-[740] text-seam">
                {counts[p.to]} <span className="sr-only">waiting</span>
              </span>
            ) : null}
          </Link>
        ))}
      </nav>
      <div className="ml-auto flex items-center gap-5">
        <div className="hidden lg:block">
          <FindBox ref={wideFind} />
        </div>
        <button
          type="button"
          className="flex size-[34px] items-center justify-center rounded-full border border-edge lg:hidden"
          aria-label="Find a case"
          aria-expanded={finding}
          onClick={() => (finding ? setFinding(false) : startFinding())}
        >
          <FindGlyph />
        </button>
        <div className="hidden lg:block">
          <ThemeSwitch />
        </div>
        <PersonMenu person={person} />
      </div>
      {finding ? (
        <div className="w-full pb-2 lg:hidden">
          <FindBox ref={narrowFind} />
        </div>
      ) : null}
    </header>
  );
}
