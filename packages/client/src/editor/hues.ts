/** Classes of base.css that give a person's colours; the same order as the rings. */
const hues = ['im', 'dh', 'no', 'rs', 'ap', 'pl'] as const;

/** The colour class of a person. */
export const hueClass = (hue: number): string => hues[Math.abs(Math.trunc(hue)) % hues.length] ?? 'ap';
