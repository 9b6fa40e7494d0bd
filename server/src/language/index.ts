export { readDocument } from './read-document';
