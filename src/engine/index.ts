export * from './report.ts';
export { createSession, type Session } from './session.ts';
export { vocabulary, type VocabularyWord } from './vocabulary.ts';
