import { HttpErrorResponse } from '@angular/common/http';
import { Problem } from '@riseback/contracts';

/** Whatever went wrong with a request, as the one shape that screens show. */
export function toProblem(error: unknown): Problem {
  if (error instanceof HttpErrorResponse) {
    const parsed = Problem.safeParse(error.error);
    if (parsed.success) return parsed.data;
    if (error.status === 0) {
      return {
        type: 'about:blank',
        title: 'The server cannot be reached',
        status: 0,
        detail: 'Check the network and try again.',
      };
    }
    return { type: 'about:blank', title: `The request failed (${String(error.status)})`, status: error.status };
  }
  return {
    type: 'about:blank',
    title: 'The answer could not be understood',
    status: 0,
    detail: 'Reload the page: the application may have been updated.',
  };
}

/** Worth another try by itself: no answer at all, or a server that says it is busy. */
export function isTransient(error: unknown): boolean {
  return (
    error instanceof HttpErrorResponse &&
    (error.status === 0 || error.status === 502 || error.status === 503 || error.status === 504)
  );
}
