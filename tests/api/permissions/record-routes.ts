import type { Ability } from '@stillroom/shared/roles';

/** Routes of a frozen record; guarded by the role at the notebook it was frozen from. */
export const recordRoutes: readonly {
  readonly method: string;
  readonly address: string;
  readonly ability: Ability;
}[] = [
  { method: 'GET', address: '/api/records/:record', ability: 'record.read' },
  { method: 'GET', address: '/api/records/:record/file', ability: 'record.export' },
  { method: 'POST', address: '/api/records/:record/reviews', ability: 'record.invite' },
  { method: 'DELETE', address: '/api/records/:record/reviews/:review', ability: 'record.withdraw' },
  { method: 'PUT', address: '/api/records/:record/public', ability: 'notebook.publish' },
];
