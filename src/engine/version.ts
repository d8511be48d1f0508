/**
 * Version of the measuring engine, kept with every measurement and comparison. Raise it whenever a value or a
 * notice of any circuit may change: captures measured by an older version are then measured again in the background.
 */
export const ENGINE_VERSION = '1.1.0';
