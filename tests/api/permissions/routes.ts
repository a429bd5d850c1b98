import type { Ability } from '@stillroom/shared/roles';
import { type Caller, type Fixture, png } from './fixture.ts';

/** A route that the role table guards, and a good request to it. */
export interface GuardedRoute {
  readonly method: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  /** As the list of addresses writes it. */
  readonly address: string;
  readonly ability: Ability;
  /** What an outsider is told is not there. */
  readonly door: 'group' | 'notebook' | 'record';
  /** Parts of the address beside `:group`, `:notebook` and `:record`. */
  readonly parts?: (fixture: Fixture, caller: Caller) => Readonly<Record<string, string>>;
  readonly body?: (fixture: Fixture) => unknown;
}

/** Of a result that nobody computed. */
const digest = `sha256:${'0'.repeat(64)}`;
const picture = (): FormData => {
  const form = new FormData();
  form.set('picture', new Blob([png], { type: 'image/png' }), 'picture.png');
  return form;
};
const file = { format: 'stillroom-notebook/1', title: 'Brought along', subject: 'none', cells: [] };
const invitation = { email: 'someone@example.org', role: 'reader', notebooks: null, message: '' };

const inAMonth = (): string => new Date(Date.now() + 30 * 24 * 3_600_000).toISOString().slice(0, 10);

export const guardedRoutes: readonly GuardedRoute[] = [
  { method: 'GET', address: '/api/groups/:group', ability: 'group.read', door: 'group' },
  {
    method: 'PATCH',
    address: '/api/groups/:group',
    ability: 'group.rename',
    door: 'group',
    body: () => ({ name: 'Another name' }),
  },
  {
    method: 'PATCH',
    address: '/api/groups/:group/members/:person',
    ability: 'group.members.write',
    door: 'group',
    parts: ({ target }) => ({ person: target }),
    body: () => ({ role: 'author', notebooks: null }),
  },
  {
    method: 'DELETE',
    address: '/api/groups/:group/members/:person',
    ability: 'group.members.write',
    door: 'group',
    parts: ({ target }) => ({ person: target }),
  },
  {
    method: 'DELETE',
    address: '/api/groups/:group/members/:person',
    ability: 'group.leave',
    door: 'group',
    parts: ({ self }, caller) => ({ person: self(caller) }),
  },
  {
    method: 'POST',
    address: '/api/groups/:group/invitations',
    ability: 'group.invite',
    door: 'group',
    body: () => invitation,
  },
  {
    method: 'DELETE',
    address: '/api/groups/:group/invitations/:invitation',
    ability: 'group.invite',
    door: 'group',
    parts: (fixture) => ({ invitation: fixture.invitation }),
  },
  {
    method: 'POST',
    address: '/api/groups/:group/hand-over',
    ability: 'group.handOver',
    door: 'group',
    body: ({ target }) => ({ to: target }),
  },
  { method: 'GET', address: '/api/groups/:group/audit', ability: 'group.audit.read', door: 'group' },
  { method: 'GET', address: '/api/groups/:group/audit.csv', ability: 'group.audit.read', door: 'group' },
  {
    method: 'POST',
    address: '/api/groups/:group/notebooks',
    ability: 'notebook.create',
    door: 'group',
    body: () => ({ title: 'A new one' }),
  },
  {
    method: 'POST',
    address: '/api/groups/:group/notebook-files',
    ability: 'notebook.create',
    door: 'group',
    body: () => file,
  },
  { method: 'GET', address: '/api/notebooks/:notebook', ability: 'notebook.read', door: 'notebook' },
  { method: 'DELETE', address: '/api/notebooks/:notebook', ability: 'notebook.delete', door: 'notebook' },
  {
    method: 'POST',
    address: '/api/notebooks/:notebook/restore',
    ability: 'notebook.restore',
    door: 'notebook',
  },
  {
    method: 'PUT',
    address: '/api/notebooks/:notebook/public',
    ability: 'notebook.publish',
    door: 'notebook',
    body: () => ({ public: true }),
  },
  { method: 'GET', address: '/api/notebooks/:notebook/file', ability: 'notebook.export', door: 'notebook' },
  {
    method: 'GET',
    address: '/api/notebooks/:notebook/fair-copy',
    ability: 'notebook.read',
    door: 'notebook',
  },
  {
    method: 'GET',
    address: '/api/notebooks/:notebook/results/:digest',
    ability: 'notebook.read',
    door: 'notebook',
    parts: () => ({ digest }),
  },
  {
    method: 'POST',
    address: '/api/notebooks/:notebook/cells/:cell/run',
    ability: 'notebook.run',
    door: 'notebook',
    parts: () => ({ cell: 'c1' }),
  },
  { method: 'POST', address: '/api/notebooks/:notebook/run', ability: 'notebook.run', door: 'notebook' },
  {
    method: 'POST',
    address: '/api/notebooks/:notebook/cells/:cell/stop',
    ability: 'notebook.run',
    door: 'notebook',
    parts: () => ({ cell: 'c1' }),
  },
  {
    method: 'POST',
    address: '/api/notebooks/:notebook/cells/:cell/trial',
    ability: 'notebook.run',
    door: 'notebook',
    parts: () => ({ cell: 'c1' }),
    body: () => ({ constants: { k: 2 } }),
  },
  { method: 'GET', address: '/api/notebooks/:notebook/remarks', ability: 'notebook.read', door: 'notebook' },
  {
    method: 'POST',
    address: '/api/notebooks/:notebook/remarks',
    ability: 'notebook.remark',
    door: 'notebook',
    body: () => ({ cell: 'c1', quote: '', text: 'Another remark.' }),
  },
  {
    method: 'POST',
    address: '/api/notebooks/:notebook/remarks/:remark/answers',
    ability: 'notebook.remark',
    door: 'notebook',
    parts: ({ remark }) => ({ remark }),
    body: () => ({ text: 'An answer.' }),
  },
  {
    method: 'PATCH',
    address: '/api/notebooks/:notebook/remarks/:remark',
    ability: 'notebook.settle',
    door: 'notebook',
    parts: ({ remark }) => ({ remark }),
    body: () => ({ settled: true }),
  },
  {
    method: 'POST',
    address: '/api/notebooks/:notebook/pictures',
    ability: 'notebook.edit',
    door: 'notebook',
    body: picture,
  },
  { method: 'GET', address: '/api/notebooks/:notebook/freeze', ability: 'notebook.freeze', door: 'notebook' },
  {
    method: 'POST',
    address: '/api/notebooks/:notebook/freeze',
    ability: 'notebook.freeze',
    door: 'notebook',
    body: () => ({ reasons: {} }),
  },
  { method: 'GET', address: '/api/records/:record', ability: 'record.read', door: 'record' },
  { method: 'GET', address: '/api/records/:record/file', ability: 'record.export', door: 'record' },
  {
    method: 'POST',
    address: '/api/records/:record/reviews',
    ability: 'record.invite',
    door: 'record',
    body: () => ({ email: 'referee@example.org', name: '', masked: true, until: inAMonth(), message: '' }),
  },
  {
    method: 'DELETE',
    address: '/api/records/:record/reviews/:review',
    ability: 'record.withdraw',
    door: 'record',
    parts: ({ review }) => ({ review }),
  },
  {
    method: 'PUT',
    address: '/api/records/:record/public',
    ability: 'notebook.publish',
    door: 'record',
    body: () => ({ public: true }),
  },
];

/** The operator's room. */
export const operatorRoutes: readonly Pick<GuardedRoute, 'method' | 'address' | 'ability' | 'body'>[] = [
  { method: 'GET', address: '/api/operator/health', ability: 'operator.health' },
  { method: 'GET', address: '/api/operator/people', ability: 'operator.people' },
  { method: 'GET', address: '/api/operator/queue', ability: 'operator.queue' },
  { method: 'GET', address: '/api/operator/outbox', ability: 'operator.outbox' },
  { method: 'POST', address: '/api/operator/outbox/:mail/showing', ability: 'operator.letters' },
  {
    method: 'PATCH',
    address: '/api/operator/settings',
    ability: 'operator.settings',
    body: () => ({ signUp: 'invitation' }),
  },
];

/** Routes that ask for an account and nothing more: they are about oneself. */
export const ownRoutes = [
  'GET /api/account',
  'PATCH /api/account',
  'DELETE /api/account/sessions',
  'DELETE /api/account/sessions/:session',
  'GET /api/shelf',
  'GET /api/groups',
  'POST /api/groups',
  'POST /api/invitations/:token',
];

/** Routes for anybody: what they need is a password, or a token that was sent to somebody. */
export const openRoutes = [
  'GET /api/session',
  'POST /api/session',
  'DELETE /api/session',
  'POST /api/accounts',
  'POST /api/accounts/confirm',
  'POST /api/password-resets',
  'PUT /api/password-resets',
  'GET /api/invitations/:token',
  'GET /api/notebooks/:notebook/pictures/:digest',
];

const asReviewer = { standing: 'reviewer', link: 'review' } as const;
const publicly = <Link extends 'copy' | 'record'>(link: Link) => ({ standing: 'public', link }) as const;

/** What somebody with a link may do: whoever has the secret in the address stands where it says. */
export interface LinkRoute {
  readonly method: GuardedRoute['method'];
  readonly address: string;
  readonly standing: 'public' | 'reviewer';
  /** Which link it is. */
  readonly link: 'copy' | 'record' | 'review';
  readonly ability: Ability;
  readonly body?: unknown;
  /** Status for whoever has the link. */
  readonly good: number;
}

const verdict = { recommendation: 'take', toAuthors: 'Good.', toEditor: '', claims: {} };

/** The last one ends the review. */
export const linkRoutes: readonly LinkRoute[] = [
  { method: 'GET', address: '/api/public/:token', ...publicly('copy'), ability: 'notebook.read', good: 200 },
  {
    method: 'GET',
    address: '/api/public-records/:token',
    ...publicly('record'),
    ability: 'record.read',
    good: 200,
  },
  {
    method: 'GET',
    address: '/api/public-records/:token/file',
    ...publicly('record'),
    ability: 'record.export',
    good: 200,
  },
  { method: 'GET', address: '/api/review/:token', ...asReviewer, ability: 'review.read', good: 200 },
  { method: 'GET', address: '/api/review/:token/file', ...asReviewer, ability: 'record.export', good: 200 },
  {
    method: 'POST',
    address: '/api/review/:token/reruns',
    ...asReviewer,
    ability: 'review.rerun',
    body: { cell: 'nowhere' },
    // The record of these tests has no cell.
    good: 404,
  },
  {
    method: 'GET',
    address: '/api/review/:token/reruns/:rerun',
    ...asReviewer,
    ability: 'review.read',
    good: 404,
  },
  {
    method: 'POST',
    address: '/api/review/:token/remarks',
    ...asReviewer,
    ability: 'review.remark',
    body: { cell: 'c1', quote: '', text: 'Why?' },
    good: 201,
  },
  {
    method: 'PUT',
    address: '/api/review/:token/verdict',
    ...asReviewer,
    ability: 'review.verdict',
    body: verdict,
    good: 204,
  },
];
