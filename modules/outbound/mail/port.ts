/** The world's post office, as the application sees it. */
export interface MailAttachment {
  readonly name: string;
  readonly mime: string;
  readonly bytes: Uint8Array;
}

export interface MailMessage {
  /** `<…@…>`, chosen by the caller from what the message is about, so that a repeat is recognisable. */
  readonly messageId: string;
  readonly to: string;
  readonly toName?: string;
  /** Shown beside the sending address; the address itself belongs to the configuration. */
  readonly fromName?: string;
  readonly replyTo?: string;
  readonly subject: string;
  readonly text: string;
  readonly html?: string;
  readonly attachments?: readonly MailAttachment[];
}

export interface MailReceipt {
  readonly messageId: string;
  readonly accepted: readonly string[];
  readonly rejected: readonly string[];
}

export interface MailPort {
  /** @throws MailFailure */
  send(message: MailMessage): Promise<MailReceipt>;
  close(): void;
}

/** Why a message did not go out, and whether trying again can help. */
export class MailFailure extends Error {
  override readonly name = "MailFailure";
  constructor(
    message: string,
    readonly retry: boolean,
    /** Three-digit SMTP reply, where the server gave one. */
    readonly reply: number | null,
    options?: { cause?: unknown },
  ) {
    super(message, options);
  }
}
