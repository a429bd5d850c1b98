/**
 * The number of a record as it is printed: initials of the group and four figures, "BK-0014".
 */
export function recordNumber(group: string, number: number): string {
  const initials = group
    .split(/\s+/)
    .map((word) => word.charAt(0))
    .filter((sign) => /\p{L}/u.test(sign))
    .slice(0, 3)
    .join('')
    .toLocaleUpperCase('en');
  return `${initials || 'R'}-${String(number).padStart(4, '0')}`;
}
