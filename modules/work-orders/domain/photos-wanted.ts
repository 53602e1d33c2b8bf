/** Both faces, the ports, any damage: fewer is a question, not a refusal. Common practice, no source. */
export const PHOTOS_WANTED = 4;
