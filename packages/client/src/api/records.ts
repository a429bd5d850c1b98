import type {
  FreezeView,
  RecordView,
  RemarkView,
  RerunView,
  ReviewSummary,
  ReviewView,
} from '@stillroom/shared/contracts';
import { request } from './client.ts';

export const fetchFreeze = (notebook: string) =>
  request<FreezeView>('GET', `/api/notebooks/${notebook}/freeze`);
export const freeze = (notebook: string, reasons: Record<string, string>) =>
  request<{ id: string; number: number }>('POST', `/api/notebooks/${notebook}/freeze`, { reasons });
export const fetchRecord = (record: string) => request<RecordView>('GET', `/api/records/${record}`);
export const fetchPublicRecord = (token: string) =>
  request<RecordView>('GET', `/api/public-records/${token}`);
export const publishRecord = (record: string, open: boolean) =>
  request<{ publicLink: string | null }>('PUT', `/api/records/${record}/public`, { public: open });
export const inviteReviewer = (
  record: string,
  form: { email: string; name: string; masked: boolean; until: string; message: string },
) => request<ReviewSummary>('POST', `/api/records/${record}/reviews`, form);
export const withdrawReview = (record: string, review: string) =>
  request<void>('DELETE', `/api/records/${record}/reviews/${review}`);

const at = (token: string) => `/api/review/${encodeURIComponent(token)}`;
export const openReview = (token: string) => request<ReviewView>('GET', at(token));
export const rerun = (token: string, cell?: string) =>
  request<RerunView>('POST', `${at(token)}/reruns`, cell === undefined ? {} : { cell });
export const fetchRerun = (token: string, id: string) =>
  request<RerunView>('GET', `${at(token)}/reruns/${id}`);
export const writeReviewRemark = (token: string, remark: { cell: string; quote: string; text: string }) =>
  request<RemarkView>('POST', `${at(token)}/remarks`, remark);
export const sendVerdict = (token: string, verdict: unknown) =>
  request<void>('PUT', `${at(token)}/verdict`, verdict);
