export * from '../run/solved.js';
