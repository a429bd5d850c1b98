import type { AccountView, Me, SessionView } from '@stillroom/shared/contracts';
import { request } from './client.ts';

export const fetchSession = () => request<SessionView>('GET', '/api/session');
export const signIn = (email: string, password: string) =>
  request<Me>('POST', '/api/session', { email, password });
export const signOut = () => request<void>('DELETE', '/api/session');
export const signUp = (form: { email: string; name: string; password: string; invitation?: string }) =>
  request<Me | undefined>('POST', '/api/accounts', form);
export const confirmAddress = (token: string) => request<Me>('POST', '/api/accounts/confirm', { token });
export const askForNewPassword = (email: string) => request<void>('POST', '/api/password-resets', { email });
export const setNewPassword = (token: string, password: string) =>
  request<void>('PUT', '/api/password-resets', { token, password });
export const fetchAccount = () => request<AccountView>('GET', '/api/account');
export const changeAccount = (patch: { name?: string; password?: { current: string; next: string } }) =>
  request<AccountView>('PATCH', '/api/account', patch);
export const endOtherSessions = () => request<void>('DELETE', '/api/account/sessions');
export const endSession = (id: string) => request<void>('DELETE', `/api/account/sessions/${id}`);
