import { usePerson } from '#src/lib/session.ts';
import { useTitle } from '#src/lib/title.ts';
import { Sentence } from '#src/ui/sentence.tsx';
import { ChangePasswordForm } from '#src/features/session/change-password-form.tsx';

export function Component() {
  useTitle('Change password');
  const person = usePerson();
  return (
    <>
      <Sentence below="It signs you in, and it signs your decisions.">
        Change your <b>password</b>
      </Sentence>
      <ChangePasswordForm email={person?.email ?? ''} />
    </>
  );
}
