import type { ColumnOptions } from 'typeorm';

/** Options of columns that occur everywhere. Every column names its type: no metadata is emitted for decorators. */
export const time = { type: 'timestamptz' } as const satisfies ColumnOptions;
export const optionalTime = { type: 'timestamptz', nullable: true } as const satisfies ColumnOptions;
export const now = { type: 'timestamptz', default: () => 'now()' } as const satisfies ColumnOptions;
