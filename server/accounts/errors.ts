import { Failure } from '../http/failure';
import { invalid } from '../http/parse';

export const weakPassword = (message: string): Failure => invalid([{ field: 'password', message }]);

export function emailTaken(): Failure {
  const message = 'This address already has an account; sign in, or use another address.';
  return new Failure('conflict', 'accounts.email_taken', message, {
    issues: [{ field: 'email', message }],
  });
}

export function wrongCredentials(): Failure {
  return new Failure(
    'signed_out',
    'session.wrong_credentials',
    'The e-mail address or the password is wrong; check both, then try again.',
  );
}
