import { useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { call } from '#src/lib/call.ts';
import { useTitle } from '#src/lib/title.ts';
import { Sentence } from '#src/ui/sentence.tsx';
import { AddPersonForm } from '#src/features/people/add-person-form.tsx';
import { addPerson } from '#shared/contracts/people.ts';

export function Component() {
  useTitle('Add a person');
  const client = useQueryClient();
  const navigate = useNavigate();
  return (
    <>
      <Sentence>
        Add a <b>person</b>
      </Sentence>
      <AddPersonForm
        save={async (body) => {
          await call(addPerson, { body });
          await client.invalidateQueries({ queryKey: ['people'] });
          await navigate('/people');
        }}
      />
    </>
  );
}
