export { factor } from './factor';
export { addSources } from './retarded';
export { solve } from './solve';
