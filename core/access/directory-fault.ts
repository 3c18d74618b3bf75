/**
 * Why a sign-in through the plant's directory did not hold. The code travels in an address, the words stand on the page:
 * so that no address makes the page say what somebody else wants to be believed.
 */
export const directoryFaults = {
  'begun-elsewhere': 'the sign-in was not begun in this browser, or took too long; begin again.',
  'not-let-in': 'it did not let you in.',
  'says-nothing': 'it did not say who you are.',
  'account-disabled': 'your account here is disabled.',
  'account-gone': 'the account that was to be linked is gone.',
  'name-taken': 'somebody here has your name already. If that is you, sign in by your password and link the account.',
  'name-unfit': 'your name there is empty, or holds characters that nobody sees or letters of two alphabets.',
  unreachable: 'it cannot be reached just now.',
} as const;

export type DirectoryFault = keyof typeof directoryFaults;

export const isDirectoryFault = (text: string): text is DirectoryFault => Object.hasOwn(directoryFaults, text);
