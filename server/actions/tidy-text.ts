/**
 * Text as it is kept: without blanks around it, and with accents composed, so that "é" typed on two phones is one
 * tag. The few letters that composing would lengthen stay as typed, so that a length once checked still holds.
 * @param text what was typed
 */
export function tidyText(text: string): string {
  const trimmed = text.trim();
  const composed = trimmed.normalize('NFC');
  return composed.length > trimmed.length ? trimmed : composed;
}
