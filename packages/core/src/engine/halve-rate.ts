/**
 * Filters and halves the rate of a run of samples: `output[at + k]` becomes the filtered value at
 * `samples[centre + 2k]`, for k from 0 to below `count`. Each is summed from the middle outward, so its bits
 * do not depend on the run it is part of.
 *
 * @param taps - one side of a half-band filter, at the distances 1, 3, 5, …; `samples` must reach as far
 */
export function halveRate(
  taps: Float64Array,
  samples: Float64Array,
  centre: number,
  count: number,
  output: Float64Array,
  at: number,
): void {
  const end = at + count;
  const pairs = taps.length;
  // Four outputs at a time: a sample serves one output now and the next output one tap later, so samples
  // move along in variables and each tap loads one per side. `| 0` spares the check for overflow of an
  // index. Less than half the time of one output after the other; five or more outputs would need more
  // registers than there are.
  for (; at + 4 <= end; at += 4, centre += 8) {
    let y0 = 0.5 * samples[centre]!;
    let y1 = 0.5 * samples[centre + 2]!;
    let y2 = 0.5 * samples[centre + 4]!;
    let y3 = 0.5 * samples[centre + 6]!;
    let right0 = samples[centre + 1]!;
    let right1 = samples[centre + 3]!;
    let right2 = samples[centre + 5]!;
    let left1 = right0;
    let left2 = right1;
    let left3 = right2;
    let left = centre - 1;
    let right = centre + 7;
    for (let j = 0; j < pairs; j = (j + 1) | 0) {
      const tap = taps[j]!;
      const left0 = samples[left]!;
      const right3 = samples[right]!;
      y0 += tap * (left0 + right0);
      y1 += tap * (left1 + right1);
      y2 += tap * (left2 + right2);
      y3 += tap * (left3 + right3);
      left3 = left2;
      left2 = left1;
      left1 = left0;
      right0 = right1;
      right1 = right2;
      right2 = right3;
      left = (left - 2) | 0;
      right = (right + 2) | 0;
    }
    output[at] = y0;
    output[at + 1] = y1;
    output[at + 2] = y2;
    output[at + 3] = y3;
  }
  for (; at < end; at++, centre += 2) {
    let y = 0.5 * samples[centre]!;
    for (let j = 0, distance = 1; j < pairs; j++, distance += 2) {
      y += taps[j]! * (samples[centre - distance]! + samples[centre + distance]!);
    }
    output[at] = y;
  }
}
