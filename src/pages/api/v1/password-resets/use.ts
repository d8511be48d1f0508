import { nothing } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { resetPassword } from '../../../../server/session/reset-password.ts';

export const POST = route('session.reset', async ({ body, address }) => {
  await resetPassword({ ...body, address });
  return nothing;
});
