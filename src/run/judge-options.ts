import { mistake } from '../messages/build.js';
import type { Message } from '../messages/message.js';
import { interpreterKinds, type ValueOptions } from './options.js';

/** Mistakes in what a library's caller hands in beside the scenario; the command line reads its own more closely. */
export function judgeOptions({ interpreter, fitMemoryBytes }: ValueOptions): Message[] {
  const messages: Message[] = [];
  if (interpreter !== undefined && !interpreterKinds.includes(interpreter)) {
    messages.push(
      mistake('bad-override', {
        what: `The interpreter asked for, ${JSON.stringify(interpreter)}, does not exist.`,
        why: 'Another one than the one meant would run the programs.',
        mend: `Choose one of ${interpreterKinds.join(', ')}, or leave \`interpreter\` out.`,
        evidence: { interpreter: String(interpreter), override: '--interpreter' },
      }),
    );
  }
  if (fitMemoryBytes !== undefined && !(Number.isFinite(fitMemoryBytes) && fitMemoryBytes > 0)) {
    messages.push(
      mistake('bad-override', {
        what: `\`fitMemoryBytes\` is ${String(fitMemoryBytes)}; it must be a positive number.`,
        why: 'It is the memory, in bytes, that the paths of the fit may take.',
        mend: 'Give a number such as 256e6, or leave it out.',
        evidence: { fitMemoryBytes: String(fitMemoryBytes), override: '--fit-memory' },
      }),
    );
  }
  return messages;
}
