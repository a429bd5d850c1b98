import type { MigrationInterface } from 'typeorm';
import { Compute1796083203000 } from './2026-12-01-compute.ts';
import { FailedResults1796083205000 } from './2026-12-01-failed-results.ts';
import { Groups1796083201000 } from './2026-12-01-groups.ts';
import { Letters1796083208000 } from './2026-12-01-letters.ts';
import { Notebooks1796083202000 } from './2026-12-01-notebooks.ts';
import { People1796083200000 } from './2026-12-01-people.ts';
import { RemarksOfReviews1796083206000 } from './2026-12-01-remarks-of-reviews.ts';
import { Records1796083204000 } from './2026-12-01-records.ts';
import { RerunEngine1796083207000 } from './2026-12-01-rerun-engine.ts';

/** All migrations in the order they run (by the number at the end of each name); what was released never changes. */
export const migrations: readonly (new () => MigrationInterface)[] = [
  People1796083200000,
  Groups1796083201000,
  Notebooks1796083202000,
  Compute1796083203000,
  Records1796083204000,
  FailedResults1796083205000,
  RemarksOfReviews1796083206000,
  RerunEngine1796083207000,
  Letters1796083208000,
];
