import { useTitle } from '#src/lib/title.ts';
import { ButtonLink } from '#src/ui/button.tsx';
import { EmptyState } from '#src/ui/empty-state.tsx';
import { Sentence } from '#src/ui/sentence.tsx';

export function Component() {
  useTitle('Not found');
  return (
    <>
      <Sentence>
        There is <b>nothing</b> at this address
      </Sentence>
      <EmptyState
        fact="The page was moved or never was."
        next="Find the case by its number, or start from the list."
      >
        <ButtonLink to="/" small>
          Work list
        </ButtonLink>
      </EmptyState>
    </>
  );
}
