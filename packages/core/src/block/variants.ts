import type { Expression } from '../equation/expression.ts';
import { TailpairError } from '../quantity/error.ts';
import { type BoundEquations, bindEquations, type InputWiring } from './bind-equations.ts';
import type { KindDeclaration } from './kind.ts';

/** A kind that asks more independent set-up questions than this is refused rather than half checked. */
const mostQuestions = 6;

/** A kind's equations as they stand for one set of answers to their set-up questions. */
export interface EquationVariant {
  readonly bound: BoundEquations;
  /** What was asked, and whether it was taken as zero. */
  readonly answers: readonly { readonly asked: Expression; readonly isZero: boolean }[];
}

/** Every combination of words of the choice parameters. */
export function wordings({ params }: KindDeclaration): Record<string, string>[] {
  return Object.entries(params).reduce<Record<string, string>[]>(
    (known, [name, parameter]) =>
      parameter.form === 'choice'
        ? known.flatMap((words) => parameter.choices.map((word) => ({ ...words, [name]: word })))
        : known,
    [{}],
  );
}

/**
 * Traces the equations of a kind for all answers its set-up questions can get.
 *
 * @throws TailpairError `declaration` where they ask too much
 */
export function* equationVariants(
  declaration: KindDeclaration,
  words: Readonly<Record<string, string>>,
  wiring: (port: string) => InputWiring,
): Generator<EquationVariant, void, undefined> {
  const pending: boolean[][] = [[]];
  for (let given = pending.pop(); given !== undefined; given = pending.pop()) {
    const known = given;
    const answers: { asked: Expression; isZero: boolean }[] = [];
    const decide = (asked: Expression): boolean => {
      const isZero = known[answers.length] ?? false;
      if (answers.length >= known.length) pending.push([...answers.map((it) => it.isZero), true]);
      answers.push({ asked, isZero });
      if (answers.length <= mostQuestions) return isZero;
      throw new TailpairError(
        'declaration',
        `more than ${mostQuestions} set-up questions (isZero) in one variant`,
        { where: declaration.kind },
      );
    };
    yield { bound: bindEquations(declaration, { words, wiring, decide }), answers };
  }
}
