import type { Message } from '../messages/message.js';
import { renderMessages } from '../messages/render.js';
import { messageWidth, styleFor } from './terminal.js';

/** Prints the answer on standard output. */
export function deliver(text: string): void {
  process.stdout.write(text.endsWith('\n') ? text : `${text}\n`);
}

/** Prints the one JSON document of a command on standard output. */
export function deliverDocument(document: object): void {
  deliver(JSON.stringify(document, null, 2));
}

/** Says something to the person at the terminal, beside the answer. */
export function remark(text: string): void {
  process.stderr.write(text.endsWith('\n') ? text : `${text}\n`);
}

/** Shows messages to the person at the terminal. */
export function showMessages(messages: readonly Message[]): void {
  if (messages.length > 0) remark(renderMessages(messages, styleFor(process.stderr), messageWidth(process.stderr)));
}

/** Refuses: the messages for people on standard error and, if a program is listening, as a document on standard output. */
export function refuse(messages: readonly Message[], json: boolean): void {
  showMessages(messages);
  if (json) deliverDocument({ schemaVersion: 1, status: 'refused', messages });
}
