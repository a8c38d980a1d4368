import { useRouteError } from 'react-router-dom';
import { useTitle } from '#src/lib/title.ts';
import { asProblem } from '#src/lib/problem.ts';
import { Button } from '#src/ui/button.tsx';
import { Notice } from '#src/ui/notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';

/** What nobody caught nearer to its cause, a screen that could not be fetched included. */
export function RouteProblem() {
  useTitle('Broken page');
  const problem = asProblem(useRouteError());
  return (
    <div className="page-margin">
      <Sentence deeds={<Button onClick={() => location.reload()}>Load the page again</Button>}>
        This page <b>broke off</b>
      </Sentence>
      <Notice tone="bad" lead={`${problem.title}.`} role="alert">
        {problem.message}
      </Notice>
    </div>
  );
}
