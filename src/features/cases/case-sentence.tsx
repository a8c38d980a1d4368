import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { Case } from '#shared/contracts/cases.ts';
import { countWord } from '#src/features/cases/case-groups.ts';

/** The state of a case in a sentence, with what is to be done next. */
export function CaseSentence({ stored }: { stored: Case }): ReactNode {
  const inUse = stored.exposures.filter((e) => !e.withdrawn);
  const running = inUse.filter((e) => e.latest?.state === 'running' || e.latest?.state === 'queued').length;
  const newest = [...inUse].sort((a, b) => b.number - a.number)[0];
  const match = [...stored.matches].sort((a, b) => b.version - a.version)[0];
  const number = <b>{stored.number}</b>;
  switch (stored.stage) {
    case 'no-exposure':
      return (
        <>
          {number} has <b>no exposure</b> yet
        </>
      );
    case 'running':
      return (
        <>
          {number}: <b>{countWord(running)}</b> {running === 1 ? 'identification is' : 'identifications are'}{' '}
          running
        </>
      );
    case 'failed':
      return (
        <>
          {number}: the newest exposure was <b>not measured</b>
        </>
      );
    case 'identified':
    case 'ambiguous':
    case 'unidentified': {
      const ends = {
        identified: 'read it and put the match forward',
        ambiguous: 'choose, or add an exposure that decides',
        unidentified: 'no shape of the catalogue fits',
      }[stored.stage];
      return (
        <>
          {number} is{' '}
          {newest ? (
            <Link to={`/exposures/${newest.id}`} className="phrase">
              {stored.stage}
            </Link>
          ) : (
            <b>{stored.stage}</b>
          )}
          : {ends}
        </>
      );
    }
    case 'in-review':
      return (
        <>
          {number} is{' '}
          {match ? (
            <Link to={`/reviews/${match.id}`} className="phrase">
              in review
            </Link>
          ) : (
            <b>in review</b>
          )}
          , put forward by {match?.submittedBy.name ?? 'an analyst'}
        </>
      );
    case 'returned':
    case 'rejected':
      return (
        <>
          {number} was{' '}
          {match ? (
            <Link to={`/reviews/${match.id}`} className="phrase">
              {stored.stage === 'returned' ? 'sent back' : 'rejected'}
            </Link>
          ) : (
            <b>{stored.stage === 'returned' ? 'sent back' : 'rejected'}</b>
          )}{' '}
          by {match?.decision?.by.name ?? 'review'}
        </>
      );
    case 'confirmed':
      return (
        <>
          {number} is <b>confirmed</b>
          {match?.decision ? ` by ${match.decision.by.name}` : ''}
        </>
      );
  }
}
