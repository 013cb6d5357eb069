import { mistake } from '../messages/build.js';
import type { Message } from '../messages/message.js';

/** The message for anything that was thrown: only a defect of ours ever is. */
export function defectMessage(defect: unknown): Message {
  return mistake('defect', {
    what: `The program failed: ${defect instanceof Error ? defect.message : String(defect)}.`,
    why: 'This is a defect of the program and not of your scenario.',
    mend: 'Please report it, with the scenario and the command.',
  });
}
