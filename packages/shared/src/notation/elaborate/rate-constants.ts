import type { Constant } from '../../network/network.ts';
import type { Elaboration } from './stage.ts';

/** Rate constants are not negative; one that is 0 leaves its arrow in the structure, with a warning. */
export function checkRateConstants(stage: Elaboration, constants: readonly Constant[]): void {
  const checked = new Set<number>();
  for (const use of stage.rows.uses) {
    if (checked.has(use.constant)) continue;
    checked.add(use.constant);
    const constant = constants[use.constant];
    const value = constant?.quantity?.value;
    if (!constant || value === undefined || value > 0) continue;
    const at = stage.values.definition(constant.name)?.at ?? use.at;
    if (value < 0) {
      stage.complaints.error(
        at,
        `${constant.name} is ${value}; a rate constant cannot be negative.`,
        'Turn the arrow round or write a law.',
      );
    } else {
      stage.complaints.warning(
        at,
        `${constant.name} is 0.`,
        'Its arrow stays in the structure; cells that compute with values leave it out.',
      );
    }
  }
}
