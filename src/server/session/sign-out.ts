import { endSession } from './lucia.ts';

/** Ends the session that the browser's cookie names; gives the Set-Cookie line that clears it. */
export const signOut = (cookieHeader: string | undefined): Promise<string> => endSession(cookieHeader);
