import type { StopReason } from '../ode/index.ts';

/** Why a course stopped, for its reader. `nameOf` gives the species of a component. */
export function stopInWords(
  stop: StopReason,
  time: number,
  timeUnit: string | null,
  nameOf: (component: number) => string,
): string {
  const at = `t = ${Number(time.toPrecision(6))}${timeUnit === null ? '' : ` ${timeUnit}`}`;
  switch (stop.kind) {
    case 'growth':
      return `${nameOf(stop.component)} grows without bound: it passes ${stop.value.toPrecision(2)} near ${at}, and no step can go beyond.`;
    case 'not finite':
      return `The rates stop being finite numbers near ${at}; look for a division by 0 or a logarithm or root of a negative number.`;
    case 'step too small':
      return `The steps became smaller than the time can resolve near ${at}; a rate changes too abruptly there.`;
    case 'too many steps':
      return stop.stiff
        ? `${stop.limit} steps only led to ${at}: the equations are stiff, and the method asked for is not made for that. Use "auto" or "stiff".`
        : `${stop.limit} steps only led to ${at}. Ask for a shorter course or a larger tolerance.`;
    case 'event cascade':
      return `Events set each other off without end at ${at}.`;
    case 'sensitivities end':
      return `How the time of the event at ${at} moves with the constants cannot be told (its condition is grazed, jumps, or meets another), so that the sensitivities end there.`;
    case 'stopped from outside':
      return `The run was ended at ${at}, before the end of the course.`;
  }
}
