import type { Reading } from './useSetting.ts';

const number = (text: string): number => {
  const value = Number(text.trim().replaceAll(/[\s_]/gu, '').replace('−', '-').replace(',', '.'));
  if (text.trim() === '' || !Number.isFinite(value)) throw new Error(`“${text.trim()}” is not a number.`);
  return value;
};

/** One number; an empty field leaves the usual one in force. */
export const numberReading: Reading<number> = {
  read: (text) => (text.trim() === '' ? undefined : number(text)),
  print: (value) => (typeof value === 'number' ? String(value) : ''),
};

/** Numbers with commas between. */
export const numbersReading: Reading<readonly number[]> = {
  read: (text) =>
    text.trim() === ''
      ? undefined
      : text
          .split(/[,;]/u)
          .filter((part) => part.trim() !== '')
          .map(number),
  print: (value) => (Array.isArray(value) ? value.join(', ') : ''),
};

/** Named numbers: `A = 80, E = 1.2`. */
export const namedNumbersReading: Reading<Readonly<Record<string, number>>> = {
  read(text) {
    const entries = text
      .split(/,(?![^[]*\])/u)
      .filter((part) => part.trim() !== '')
      .map((part) => {
        const [name = '', value, ...rest] = part.split('=');
        if (value === undefined || rest.length > 0 || name.trim() === '')
          throw new Error(`“${part.trim()}” is not a name with a number, like A = 80.`);
        return [name.trim(), number(value)] as const;
      });
    return entries.length === 0 ? undefined : Object.fromEntries(entries);
  },
  print: (value) =>
    typeof value === 'object' && value !== null
      ? Object.entries(value)
          .map(([name, one]) => `${name} = ${String(one)}`)
          .join(', ')
      : '',
};

/** Plain words. */
export const wordsReading: Reading<string> = {
  read: (text) => (text.trim() === '' ? undefined : text),
  print: (value) => (typeof value === 'string' ? value : ''),
};
