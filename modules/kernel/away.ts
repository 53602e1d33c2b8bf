/** The digest of an error that means "the shop's data cannot be reached": the one thing a page's error may tell the browser. */
export const RECORDS_AWAY = "RECORDS_AWAY";

/** The code of a refusal that settles nothing: the same request goes out again under the same request id. */
export const TRY_AGAIN = "TRY_AGAIN";

/** Seconds until asking again is worth it. */
export const RETRY_AFTER_S = 2;

/** What a person reads: nothing was written, or a write whose answer never came. */
export const AWAY_WORDS = {
  nothing: "The shop's data cannot be reached just now. What you typed is kept. Try again.",
  unknown: "The shop's data was cut off before it answered. What you typed is kept. Try again: the same request is not carried out twice.",
} as const;
