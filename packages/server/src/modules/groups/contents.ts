import type { GroupView } from '@stillroom/shared/contracts';
import type { EntityManager } from 'typeorm';

/**
 * What a group holds, supplied by the modules that come after this one: they know groups, groups do not know them.
 */
export interface GroupContents {
  /** Notebooks of a group, those in the bin too, by title. */
  notebooks(manager: EntityManager, group: string): Promise<GroupView['notebooks']>;
  /** Records of a group, newest first; only those of the chosen notebooks, where not all (null) count. */
  records(
    manager: EntityManager,
    group: string,
    chosen: readonly string[] | null,
  ): Promise<GroupView['records']>;
}
