import type { ErrorRequestHandler, RequestHandler, Response } from 'express';
import type { ZodType, z } from 'zod';
import { type Problem, sentenceOfIssues, UserError } from '../shapes/problem';

const statusOf: Record<UserError['kind'], { status: number; title: string }> = {
  'bad entry': { status: 400, title: 'Not understood' },
  'not found': { status: 404, title: 'Not found' },
  'already there': { status: 409, title: 'Already there' },
  'too large': { status: 413, title: 'Too large' },
  'cannot be read': { status: 422, title: 'Cannot be read' },
};

/** Answers with an RFC 9457 problem document. */
export function sendProblem(response: Response, status: number, title: string, detail: string): void {
  const problem: Problem = { type: 'about:blank', title, status, detail };
  response.status(status).type('application/problem+json').send(JSON.stringify(problem));
}

export const noSuchAddress: RequestHandler = (request, response) => {
  const address = request.originalUrl.split('?')[0];
  sendProblem(
    response,
    404,
    'Not found',
    `There is no ${request.method} ${address}. The addresses are listed in /api/openapi.json.`,
  );
};

/** Every error of a route ends here: the user's mistakes as sentences, ours in the log and as one general sentence. */
export const answerError: ErrorRequestHandler = (error: unknown, _request, response, next) => {
  if (response.headersSent) return next(error);
  if (error instanceof UserError) {
    const { status, title } = statusOf[error.kind];
    return sendProblem(response, status, title, error.message);
  }
  if ((error as { code?: unknown }).code === 'SQLITE_BUSY')
    return sendProblem(
      response,
      503,
      'Busy',
      'A file is being stored just now. Nothing was changed; try again in a moment.',
    );
  const status = (error as { status?: unknown }).status;
  if (typeof status === 'number' && status >= 400 && status < 500) {
    const detail =
      status === 413
        ? 'The request is larger than is taken here.'
        : `The request could not be read: ${error instanceof Error ? error.message : 'unknown reason'}.`;
    return sendProblem(response, status, status === 413 ? 'Too large' : 'Not understood', detail);
  }
  console.error(error);
  return sendProblem(
    response,
    500,
    'Our mistake',
    'Something went wrong inside Clackwatch. Nothing was changed; the log has the details.',
  );
};

/** Validates at the edge: returns what the schema makes of the input, or throws the sentence for the person. */
export function valid<T extends ZodType>(schema: T, input: unknown, what: string): z.infer<T> {
  const result = schema.safeParse(input);
  if (!result.success) throw new UserError(sentenceOfIssues(result.error, what));
  return result.data;
}
