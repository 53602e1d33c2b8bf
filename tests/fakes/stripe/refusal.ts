/** A refusal in the provider's own form. */
export class Refusal extends Error {
  constructor(
    readonly status: number,
    readonly type: "invalid_request_error" | "card_error" | "idempotency_error" | "api_error",
    message: string,
    readonly code?: string,
    readonly param?: string,
  ) {
    super(message);
  }

  body(): { error: Record<string, string> } {
    return {
      error: {
        type: this.type,
        message: this.message,
        ...(this.code === undefined ? {} : { code: this.code }),
        ...(this.param === undefined ? {} : { param: this.param }),
      },
    };
  }
}

export const invalid = (message: string, param?: string, code?: string): Refusal => new Refusal(400, "invalid_request_error", message, code, param);

export const noSuch = (what: string, id: string): Refusal => new Refusal(404, "invalid_request_error", `No such ${what}: '${id}'`, "resource_missing", "id");
