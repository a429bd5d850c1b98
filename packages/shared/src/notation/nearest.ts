/** How many letters apart two words may be and still be taken for a slip. */
const SLIP = 2;
const LONGEST = 64;

/**
 * The candidate that a mistyped word was probably meant to be: fewest letters changed, left out, added or swapped, at
 * most two and fewer than half of the word; null where none is near. The first of equally near ones wins.
 */
export function nearest(word: string, candidates: Iterable<string>): string | null {
  let best: string | null = null;
  let bestDistance = Math.min(SLIP, Math.ceil(word.length / 2)) + 1;
  for (const candidate of candidates) {
    if (candidate === word || Math.abs(candidate.length - word.length) >= bestDistance) continue;
    if (candidate.length > LONGEST) continue;
    const distance = slipDistance(word, candidate);
    if (distance < bestDistance && distance < Math.max(word.length, candidate.length)) {
      best = candidate;
      bestDistance = distance;
    }
  }
  return best;
}

/** Edit distance with swaps of neighbours (optimal string alignment; Damerau 1964); a change of case counts half. */
function slipDistance(a: string, b: string): number {
  let before: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i += 1) {
    const row = [i];
    for (let j = 1; j <= b.length; j += 1) {
      const change = changeCost(a[i - 1] ?? '', b[j - 1] ?? '');
      let cost = Math.min((last[j] ?? 0) + 1, (row[j - 1] ?? 0) + 1, (last[j - 1] ?? 0) + change);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1])
        cost = Math.min(cost, (before[j - 2] ?? 0) + 1);
      row.push(cost);
    }
    before = last;
    last = row;
  }
  return last[b.length] ?? 0;
}

function changeCost(a: string, b: string): number {
  if (a === b) return 0;
  return a.toLowerCase() === b.toLowerCase() ? 0.5 : 1;
}
