import type { LabelCodeFault } from '@shared/codes';

/** What to say of something scanned or typed that is no label code. */
export const codeFaults: Readonly<Record<LabelCodeFault, string>> = {
  empty: 'Scan a label, or type the code printed under it.',
  bad_character: 'That is not one of our label codes. Codes use digits 2 to 9 and letters, without I, L, O and U.',
  wrong_length: 'A label code has 12 characters. Check it and try again.',
  check_failed: 'One character is off: the check character does not fit. Compare it with the label and try again.',
};
