/**
 * Edit distance with insertions, deletions, substitutions and swaps of neighbours (optimal string
 * alignment; F. Damerau, Communications of the ACM 7(3), 1964).
 */
function editDistance(a: string, b: string): number {
  let before: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, index) => index);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1];
      let best = Math.min(last[j]! + 1, row[j - 1]! + 1, last[j - 1]! + (same ? 0 : 1));
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) {
        best = Math.min(best, before[j - 2]! + 1);
      }
      row.push(best);
    }
    before = last;
    last = row;
  }
  return last[b.length]!;
}

/**
 * The name a misspelt word most likely stands for, for the cure in an error message. Case does not
 * count; one slip is forgiven per three letters, at least one; of equally near names the first.
 *
 * @returns undefined where no name is near
 */
export function nearestName(word: string, names: Iterable<string>): string | undefined {
  const slips = Math.max(1, Math.floor(word.length / 3));
  let nearest: string | undefined;
  let least = slips + 1;
  for (const name of names) {
    if (Math.abs(name.length - word.length) > slips) continue;
    const distance = editDistance(word.toLowerCase(), name.toLowerCase());
    if (distance < least && distance < name.length) {
      least = distance;
      nearest = name;
    }
  }
  return nearest;
}
