import {
  instance,
  me,
  type Instance,
  type Me,
  type SignInRequest,
  type SignUpRequest,
} from '#contract/accounts';
import { ApiProblem, requestJson, requestNothing } from './client';

export const getInstance = (): Promise<Instance> => requestJson('/api/instance', instance);

/** @returns the person with a session, or null. */
export async function getMe(): Promise<Me | null> {
  try {
    return await requestJson('/api/session', me);
  } catch (error) {
    if (error instanceof ApiProblem && error.status === 401) return null;
    throw error;
  }
}

export const signUp = (body: SignUpRequest): Promise<Me> =>
  requestJson('/api/accounts', me, { method: 'POST', body });

export const signIn = (body: SignInRequest): Promise<Me> =>
  requestJson('/api/session', me, { method: 'POST', body });

export const signOut = (): Promise<void> => requestNothing('/api/session', { method: 'DELETE' });
