import { useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { call } from '#src/lib/call.ts';
import { useTitle } from '#src/lib/title.ts';
import { Sentence } from '#src/ui/sentence.tsx';
import { BenchForm } from '#src/features/benches/bench-form.tsx';
import { addBench } from '#shared/contracts/benches.ts';

export function Component() {
  useTitle('New bench');
  const client = useQueryClient();
  const navigate = useNavigate();
  return (
    <>
      <Sentence>
        A <b>new bench</b>, as the light travels
      </Sentence>
      <BenchForm
        bench={null}
        save={async (body) => {
          await call(addBench, { body });
          await client.invalidateQueries({ queryKey: ['benches'] });
          await navigate('/benches');
        }}
      />
    </>
  );
}
