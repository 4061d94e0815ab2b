import { Failure } from '../http/failure';

export function tooManyImports(drafts: number): Failure {
  return new Failure(
    'conflict',
    'imports.too_many',
    `This workspace keeps ${drafts} imports that were begun and not saved, and has no room for another; save or remove one of them first.`,
  );
}

export function alreadySaved(): Failure {
  return new Failure(
    'conflict',
    'imports.saved',
    'This import was saved already and no longer changes; begin a new one.',
  );
}

export function importChanged(): Failure {
  return new Failure(
    'conflict',
    'imports.changed',
    'This import was changed meanwhile; load it again and look at what was found.',
  );
}

export function notReady(): Failure {
  return new Failure(
    'invalid',
    'imports.not_ready',
    'There is no network to save yet; answer what is asked and correct what is wrong first.',
  );
}
