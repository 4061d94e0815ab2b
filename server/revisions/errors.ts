import { Failure } from '../http/failure';

export function noWeights(number: number): Failure {
  return new Failure(
    'conflict',
    'revisions.no_weights',
    `The edges of revision ${number} have no weights, so no threshold can choose among them. Bring the network in with a weight column.`,
  );
}
