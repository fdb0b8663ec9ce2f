/** Set-up cannot go on, and the message says what a person can do about it. It is shown without a stack. */
export class Refusal extends Error {}
