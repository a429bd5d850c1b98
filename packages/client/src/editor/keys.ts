import { standardKeymap } from '@codemirror/commands';
import type { KeyBinding } from '@codemirror/view';

/**
 * The editors' keys: moving, selecting and deleting. Enter with a modifier is bound to nothing, and Alt Up and Down
 * belong to the page (previous and next cell), so only the standard keys are taken and Enter loses its Shift.
 */
export const editorKeys: readonly KeyBinding[] = standardKeymap.map((binding) => {
  if (binding.key !== 'Enter') return binding;
  const { shift: _unbound, ...enter } = binding;
  return enter;
});
