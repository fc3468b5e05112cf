export { EXIT, main } from './main.js';
