// @ts-check
import { prepareCheckout } from './copy.mjs';
import { PlainError } from './lib/plain-error.mjs';
import { runMain } from './lib/run-main.mjs';
import { runTool } from './lib/run-tool.mjs';
import { say } from './lib/say.mjs';
import { withServices } from './lib/with-services.mjs';

/** `npm run reset-password -- E-MAIL [--without-code]`: a new password without mail, for whoever runs the server. */
let stop = async () => {};

await runMain(
  async () => {
    const args = process.argv.slice(2);
    if (args.length === 0) throw new PlainError('Whose? npm run reset-password -- E-MAIL [--without-code]');
    await prepareCheckout(say);
    const { password } = await withServices(say, (env) => runTool('reset-password', args, env), {
      onStop: (given) => {
        stop = given;
      },
    });
    say(`The new password: ${password}`);
    say(
      'Hand it over in person. All sessions of the account have ended; it can be changed under Workshop, “Your sign-in”.',
    );
    process.exit(0);
  },
  { stop: () => stop() },
);
