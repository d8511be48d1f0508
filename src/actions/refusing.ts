import { type ActionAPIContext, ActionError } from 'astro:actions';
import { toApiError } from '../server/http/respond.ts';

/** Runs an action's handler; a refusal of the catalogue becomes the action's error, in words for the page. */
export const refusing =
  <Input, Output>(handler: (input: Input, context: ActionAPIContext) => Promise<Output>) =>
  async (input: Input, context: ActionAPIContext): Promise<Output> => {
    try {
      return await handler(input, context);
    } catch (thrown) {
      const error = toApiError(thrown, { requestId: context.locals.requestId });
      const details = (error.details ?? []).map(({ path, message }) => `${path}: ${message}`);
      throw new ActionError({
        code: ActionError.statusToCode(error.status),
        message: [error.message, error.hint, ...details].filter((part) => part !== undefined).join(' '),
      });
    }
  };
