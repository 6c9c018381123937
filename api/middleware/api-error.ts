import { sentenceOf, statusOf, type ErrorCode, type Problem } from '../../shared/contract/errors.js';

export interface ApiErrorMore {
  /** What exactly, for this request. */
  readonly detail?: string;
  /** What a form marks. */
  readonly fields?: readonly { readonly path: string; readonly message: string }[];
  /** Seconds after which another try makes sense. */
  readonly retryAfter?: number;
}

/** The one way in which a route says no. */
export class ApiError extends Error {
  constructor(
    readonly code: ErrorCode,
    readonly more: ApiErrorMore = {},
  ) {
    super(more.detail ?? sentenceOf(code));
  }

  get status(): number {
    return statusOf(this.code);
  }

  /** As it goes over the wire (RFC 9457). */
  toProblem(): Problem {
    return {
      type: `urn:shedbeat:problem:${this.code}`,
      title: sentenceOf(this.code),
      status: this.status,
      code: this.code,
      ...(this.more.detail === undefined ? {} : { detail: this.more.detail }),
      ...(this.more.fields === undefined ? {} : { fields: [...this.more.fields] }),
    };
  }
}

/** A form with one wrong field. */
export function wrongField(path: string, message: string): ApiError {
  return new ApiError('bad-request', { fields: [{ path, message }] });
}
