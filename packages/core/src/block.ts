export type { Dimension } from './quantity/dimension.ts';
export { dimensions } from './quantity/dimension.ts';
