/** Usual reasons to leave a reading out, offered while one is typed. */
export const LEAVE_OUT_WORDS = ["pressure was not held", "clay had moved", "valve not seated", "indicator slipped", "wrong range", "blower not settled", "read twice"] as const;
/** A reason is at least so many characters. */
export const REASON_CHARS_MIN = 3;

/** Is this a reason, or only a key pressed? */
export const isReason = (text: string): boolean => text.trim().length >= REASON_CHARS_MIN;
