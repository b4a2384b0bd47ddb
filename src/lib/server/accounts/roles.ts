export const ROLES = ['therapist', 'examiner', 'neurophysiologist', 'surgeon', 'reviewer', 'administrator'] as const;
export type Role = (typeof ROLES)[number];

/** Those who append to a case log. */
export const APPENDERS: readonly Role[] = ['therapist', 'examiner', 'neurophysiologist'];
/** Those who read what is in a case, once they are on its team. */
export const READERS: readonly Role[] = [...APPENDERS, 'surgeon', 'reviewer'];
