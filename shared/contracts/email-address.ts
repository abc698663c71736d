/** Answers an e-mail address as it is kept and compared: people type its case and its spaces as they like. */
export const normalizeEmail = (email: string): string => email.trim().normalize('NFC').toLowerCase()
