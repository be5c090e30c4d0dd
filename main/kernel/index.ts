export { factor } from './factor';
export { addSources } from './retarded';
export { combineRows } from './rows';
export { solve } from './solve';
