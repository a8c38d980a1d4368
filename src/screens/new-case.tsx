import { useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { call } from '#src/lib/call.ts';
import { useTitle } from '#src/lib/title.ts';
import { Sentence } from '#src/ui/sentence.tsx';
import { CaseForm } from '#src/features/cases/case-form.tsx';
import { openCase } from '#shared/contracts/cases.ts';

export function Component() {
  useTitle('New case');
  const client = useQueryClient();
  const navigate = useNavigate();
  return (
    <>
      <Sentence below="Exposures are added once the case is open.">
        A <b>new case</b>: one question about one opening
      </Sentence>
      <CaseForm
        stored={null}
        leaveTo="/"
        save={async (body) => {
          const opened = await call(openCase, { body });
          client.setQueryData(['cases', opened.id], opened);
          void client.invalidateQueries({ queryKey: ['cases', 'list'] });
          await navigate(`/cases/${opened.id}`);
        }}
      />
    </>
  );
}
