import { z } from 'zod';

/** RFC 9457 problem document. */
export const problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  detail: z.string(),
  instance: z.string().optional(),
});
export type Problem = z.infer<typeof problem>;

/** A mistake in what a person gave: it names where, what was found, what was expected, what to do. Ends a command with status 2. */
export class UserError extends Error {
  override name = 'UserError';
  constructor(
    message: string,
    readonly kind: 'bad entry' | 'not found' | 'already there' | 'too large' | 'cannot be read' = 'bad entry',
  ) {
    super(message);
  }
}

/** The first few of zod's issues as one sentence a person can act on. */
export function sentenceOfIssues(error: z.ZodError, what: string): string {
  const lines = error.issues.slice(0, 3).map((issue) => {
    const where = issue.path.length > 0 ? `${issue.path.join('.')}: ` : '';
    return `${where}${issue.message}`;
  });
  const more = error.issues.length > 3 ? ` (and ${error.issues.length - 3} more)` : '';
  return `${what}: ${lines.join('; ')}${more}`;
}
