"use client";

import { useSyncExternalStore } from "react";

const never = () => () => undefined;

/** False until the page's script runs: a key pressed before then would do nothing, or send the form past it. */
export const useReady = (): boolean => useSyncExternalStore(never, () => true, () => false);
