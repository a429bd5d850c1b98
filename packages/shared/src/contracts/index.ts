export * from './account.ts';
export * from './error.ts';
export * from './groups.ts';
export * from './notebooks.ts';
export * from './operator.ts';
export * from './records.ts';
