/** A mail ready to be sent. */
export interface OutgoingMail {
  /** With its angle brackets; the same at every try, so that a repeat shows. */
  readonly messageId: string;
  readonly to: { readonly name: string; readonly address: string };
  readonly date: Date;
  readonly siteId: string | null;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

export interface MailTransport {
  /** @throws DeliveryError when the mail was not taken */
  send(mail: OutgoingMail): Promise<void>;
  close(): void;
}

/** A mail that was not taken. The message may be stored and shown: it holds no secret. */
export class DeliveryError extends Error {
  override readonly name = 'DeliveryError';

  constructor(
    message: string,
    /** Nothing of this mail's own: the next would fail alike. */
    readonly unreachable: boolean,
  ) {
    super(message);
  }
}
