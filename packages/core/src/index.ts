export type { ErrorCode } from './quantity/error.ts';
export { TailpairError } from './quantity/error.ts';
