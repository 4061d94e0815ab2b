import { Failure } from '../http/failure';

export function noSuchAccount(): Failure {
  const message =
    'No account here has this address. Ask the person to make an account first, then add them.';
  return new Failure('not_found', 'members.no_such_account', message, {
    issues: [{ field: 'email', message }],
  });
}

export function alreadyMember(): Failure {
  const message = 'This person is a member already; change the role in the list instead.';
  return new Failure('conflict', 'members.already_member', message, {
    issues: [{ field: 'email', message }],
  });
}

export function lastOwner(): Failure {
  return new Failure(
    'conflict',
    'members.last_owner',
    'A workspace needs an owner, and this is the last one. Make somebody else an owner first.',
  );
}

export function noLongerOwner(): Failure {
  return new Failure(
    'forbidden',
    'access.wrong_role',
    'You have just ceased to own this workspace; ask an owner to make the change.',
  );
}
