import type { Ability } from '@stillroom/shared/roles';
import { computed, type ComputedRef } from 'vue';

/** What this person may do here, as the server said; only to show or hide, since the server decides anew each time. */
export function useAbilities(abilities: () => readonly Ability[]): {
  can: (ability: Ability) => boolean;
  canEdit: ComputedRef<boolean>;
  canRun: ComputedRef<boolean>;
  canRemark: ComputedRef<boolean>;
} {
  const can = (ability: Ability) => abilities().includes(ability);
  return {
    can,
    canEdit: computed(() => can('notebook.edit')),
    canRun: computed(() => can('notebook.run')),
    canRemark: computed(() => can('notebook.remark')),
  };
}
