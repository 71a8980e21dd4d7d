export * from './span.ts';
export * from './problem.ts';
export * from './refusal.ts';
export * from './budget.ts';
export * from './invariant.ts';
