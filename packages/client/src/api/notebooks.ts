import type {
  FairCopy,
  NotebookView,
  RemarkView,
  ResultView,
  ShelfView,
  TrialRequest,
  TrialView,
} from '@stillroom/shared/contracts';
import { request } from './client.ts';

const at = (notebook: string) => `/api/notebooks/${notebook}`;

export const fetchShelf = () => request<ShelfView>('GET', '/api/shelf');
export const createNotebook = (group: string, title: string) =>
  request<{ id: string }>('POST', `/api/groups/${group}/notebooks`, { title });
export const importNotebook = (group: string, file: unknown) =>
  request<{ id: string }>('POST', `/api/groups/${group}/notebook-files`, file);
export const fetchNotebook = (notebook: string) => request<NotebookView>('GET', at(notebook));
export const deleteNotebook = (notebook: string) => request<void>('DELETE', at(notebook));
export const restoreNotebook = (notebook: string) => request<void>('POST', `${at(notebook)}/restore`);
export const publishNotebook = (notebook: string, open: boolean) =>
  request<NotebookView>('PUT', `${at(notebook)}/public`, { public: open });
export const fetchFairCopy = (notebook: string) => request<FairCopy>('GET', `${at(notebook)}/fair-copy`);
export const fetchPublicCopy = (token: string) => request<FairCopy>('GET', `/api/public/${token}`);
export const fetchResult = (notebook: string, digest: string) =>
  request<ResultView>('GET', `${at(notebook)}/results/${encodeURIComponent(digest)}`);
export const runCell = (notebook: string, cell: string) =>
  request<void>('POST', `${at(notebook)}/cells/${cell}/run`);
export const runStale = (notebook: string) => request<void>('POST', `${at(notebook)}/run`);
export const stopCell = (notebook: string, cell: string) =>
  request<void>('POST', `${at(notebook)}/cells/${cell}/stop`);
export const tryValues = (notebook: string, cell: string, values: TrialRequest, signal: AbortSignal) =>
  request<TrialView>('POST', `${at(notebook)}/cells/${cell}/trial`, values, signal);
export const fetchRemarks = (notebook: string) => request<RemarkView[]>('GET', `${at(notebook)}/remarks`);
export const writeRemark = (notebook: string, remark: { cell: string; quote: string; text: string }) =>
  request<RemarkView>('POST', `${at(notebook)}/remarks`, remark);
export const answerRemark = (notebook: string, remark: string, text: string) =>
  request<RemarkView>('POST', `${at(notebook)}/remarks/${remark}/answers`, { text });
export const settleRemark = (notebook: string, remark: string, settled: boolean) =>
  request<RemarkView>('PATCH', `${at(notebook)}/remarks/${remark}`, { settled });
export const uploadPicture = (notebook: string, picture: File) => {
  const form = new FormData();
  form.append('picture', picture);
  return request<{ digest: string; url: string }>('POST', `${at(notebook)}/pictures`, form);
};
