/**
 * A tag written so that plain text order is the order people count in: A-2 before A-10.
 * Ours: each run of digits loses its leading zeros and is put behind its own length, in two digits; letters
 * are lower-cased. Tags equal but for zeros or case come out equal: order them by the tag itself.
 * @param tag up to 99 digits in a row
 */
export function tagOrder(tag: string): string {
  return tag.toLowerCase().replace(/\d+/g, (digits) => {
    const significant = digits.replace(/^0+/, '');
    return String(significant.length).padStart(2, '0') + significant;
  });
}
