import type { Expression } from '@tailpair/core/block';

/** What an output needs to know of its supply. */
export interface Rails {
  readonly supplyPositive: Expression;
  readonly supplyNegative: Expression;
  /** How close the output comes to the positive rail. */
  readonly headroomPositive: Expression;
  /** How close it comes to the negative rail. */
  readonly headroomNegative: Expression;
}

/** Lowest and highest voltage an output reaches. */
export function swing({ supplyPositive, supplyNegative, headroomPositive, headroomNegative }: Rails): {
  readonly min: Expression;
  readonly max: Expression;
} {
  return { min: supplyNegative.add(headroomNegative), max: supplyPositive.sub(headroomPositive) };
}

/** The rule that an output has some swing left. */
export function hasSwing(rails: Rails): {
  readonly holds: ReturnType<Expression['lt']>;
  readonly says: string;
} {
  const { min, max } = swing(rails);
  return {
    holds: min.lt(max),
    says: 'the headrooms leave no swing between the supply rails; lower them or raise the supply',
  };
}
