export { factor } from './factor';
export { addProduct, addRetarded } from './retarded';
export { solve } from './solve';
