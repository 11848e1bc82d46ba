import * as z from 'zod';

/** An RFC 9457 problem object, the one shape of every error over HTTP. `type` is listed in docs/problems.md. */
export const Problem = z.looseObject({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  detail: z.string().optional(),
  instance: z.string().optional(),
  /** `pointer` is RFC 6901 into the body (or the parameter's name); `detail` says what is wrong there and what would mend it. */
  errors: z.array(z.object({ pointer: z.string(), detail: z.string() })).optional(),
});
export type Problem = z.infer<typeof Problem>;
