import type {
  HealthView,
  OperatorPerson,
  OutboxMail,
  QueueView,
  ShownLetter,
} from '@stillroom/shared/contracts';
import { request } from './client.ts';

export const fetchHealth = () => request<HealthView>('GET', '/api/operator/health');
export const fetchPeople = () => request<OperatorPerson[]>('GET', '/api/operator/people');
export const fetchQueue = () => request<QueueView>('GET', '/api/operator/queue');
export const fetchOutbox = () => request<OutboxMail[]>('GET', '/api/operator/outbox');
export const showLetter = (mail: string) =>
  request<ShownLetter>('POST', `/api/operator/outbox/${mail}/showing`);
export const changeInstallation = (patch: { signUp?: 'open' | 'invitation' }) =>
  request<HealthView>('PATCH', '/api/operator/settings', patch);
