/** Sets a hyphen before a digit, or between spaces, as a minus sign, as print does. */
export function withMinus(text: string): string {
  return text.replace(/(^|[\s(,])-(?=[\d.])|(\s)-(?=\s)/gu, '$1$2−');
}
