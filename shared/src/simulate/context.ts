export * from '../run/context.js';
