/** Stands in for `server-only` outside the bundler, where it would throw. */
export {};
