export { dimensions } from '@tailpair/core/block';
