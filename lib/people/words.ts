/** What events of an account are called on its page. */
const words: Readonly<Record<string, string>> = {
  'account.invited': 'Account made',
  'account.joined': 'Invitation accepted, password chosen',
  'account.changed': 'Particulars changed',
  'account.roles-changed': 'Roles changed',
  'account.closed': 'Account closed',
  'account.reopened': 'Account reopened',
  'account.link-sent': 'Link sent',
  'account.password-changed': 'Password changed',
  'account.password-reset': 'Password chosen by a reset link',
  'account.signed-out-everywhere': 'Signed out on every device',
  'enrolment.began': 'Enrolled in a class',
  'enrolment.ended': 'Left a class',
  'accommodation.given': 'Accommodation given',
  'accommodation.ended': 'Accommodation ended',
  'slip.made': 'Slip made',
  'slip.used': 'Signed in with a slip',
};

/** An event of an account in words; one without words shows its code. */
export const eventInWords = (kind: string): string => words[kind] ?? kind;
