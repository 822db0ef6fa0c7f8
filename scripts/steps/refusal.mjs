/** A failure that the person at the keyboard can mend: its message is the whole of what they need to read. */
export class Refusal extends Error {}
