import { readFileSync } from 'node:fs';

/** A figure held to something outside the project. */
export interface Claim {
  /** What agrees with what, as a reader of docs/accuracy.md is to understand it. */
  readonly what: string;
  /** Where the expected values come from. */
  readonly source: string;
  readonly tolerance: number;
  /** Why the tolerance is what it is. */
  readonly because: string;
  /** Deviations measured; the largest magnitude counts. */
  readonly errors: readonly number[];
  /** Unit of tolerance and error; relative where left out. */
  readonly unit?: string;
}

/** One line of the page: a claim as it is printed, and its measured error rounded up to one digit. */
export interface PageRow {
  readonly topic: string;
  readonly what: string;
  readonly source: string;
  readonly tolerance: string;
  readonly unit: string;
  readonly bound: number;
}

/** Where the page stands. */
export const pageFile = new URL('../../docs/accuracy.md', import.meta.url);

/**
 * How far a measured error may exceed the page's: the mathematical functions differ in their last digits from
 * machine to machine, so what is limited by rounding moves by a small factor. A lost order of accuracy is more.
 */
export const slack = 4;

/** Below this an error is rounding and nothing else. */
const rounding = 1e-15;

/** A claim as a line of the page. */
export function rowOf(
  topic: string,
  { what, source, tolerance, because, unit = '' }: Omit<Claim, 'errors'>,
  error: number,
): PageRow {
  const suffix = unit && ` ${unit}`;
  return {
    topic,
    what,
    source,
    tolerance: `${formatNumber(tolerance)}${suffix}: ${because}`,
    unit,
    bound: roundUp(error),
  };
}

/** The next number of one digit. */
function roundUp(error: number): number {
  const exponent = Math.floor(Math.log10(Math.max(error, rounding)));
  const digit = Math.ceil(Math.max(error, rounding) / 10 ** exponent - 1e-9);
  return Number(`${digit}e${exponent}`);
}

function formatNumber(value: number): string {
  return value < 0.01 ? value.toExponential() : String(value);
}

/** The whole page. Rows of one topic stand in the order given; topics are sorted. */
export function formatPage(rows: readonly PageRow[]): string {
  const topics = [...new Set(rows.map(({ topic }) => topic))].sort();
  return [head, ...topics.map((topic) => section(topic, rows)), ''].join('\n');
}

const head = `# Accuracy

What runs are held to: each figure, where the expected value comes from, the tolerance and its reason, and the
error measured, rounded up to one digit. Without a unit an error is relative. "From memory" marks literature that
was not at hand; "common practice" marks what the trade knows and nobody published. \`npm run accuracy\` writes this
page from the reference tests; they fail where an error exceeds its tolerance, or ${slack} times what stands here.
`;

function section(topic: string, rows: readonly PageRow[]): string {
  const title = topic[0]!.toUpperCase() + topic.slice(1).replaceAll('-', ' ');
  const lines = rows
    .filter((row) => row.topic === topic)
    .map(({ what, source, tolerance, unit, bound }) =>
      ['', what, source, tolerance, `≤ ${formatNumber(bound)}${unit && ` ${unit}`}`, ''].join(' | ').trim(),
    );
  return [
    `## ${title}\n`,
    '| claim | source | tolerance | measured |',
    '| --- | --- | --- | --- |',
    ...lines,
    '',
  ].join('\n');
}

/** The rows of a page, read back. */
export function parsePage(text: string): PageRow[] {
  return text
    .split('\n## ')
    .slice(1)
    .flatMap((part) => {
      const [title, , , , ...lines] = part.split('\n');
      const topic = title!.toLowerCase().replaceAll(' ', '-');
      return lines
        .filter((line) => line.startsWith('|'))
        .map((line): PageRow => {
          const [what, source, tolerance, measured] = line
            .slice(2, -2)
            .split(' | ')
            .map((cell) => cell.trim());
          const [, bound, unit] = /^≤ (\S+) ?(.*)$/.exec(measured!)!;
          return {
            topic,
            what: what!,
            source: source!,
            tolerance: tolerance!,
            unit: unit!,
            bound: Number(bound),
          };
        });
    });
}

let known: PageRow[] | undefined;

/** The rows of the page as it is committed. */
export function committedRows(): readonly PageRow[] {
  known ??= parsePage(readFileSync(pageFile, 'utf8'));
  return known;
}
