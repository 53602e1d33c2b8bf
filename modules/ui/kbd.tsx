/** Key cap printed on a control or in a key hint. */
export const Kbd = ({ children }: { children: string }) => <kbd>{children}</kbd>;
