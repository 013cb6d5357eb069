/**
 * Dresses a piece of text for its role (`title`, `strong`, `quiet`, `good`, `doubt` and the roles of the message
 * renderer). The report names roles and leaves colours to whoever knows the terminal.
 */
export type Style = (role: string, text: string) => string;

/** The style of a file or a pipe: the text as it is. */
export const plainStyle: Style = (_role, text) => text;
