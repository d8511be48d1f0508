// @ts-check

/** A fault that the person at the terminal can act on: its message is the whole story, so no stack is shown. */
export class PlainError extends Error {}
