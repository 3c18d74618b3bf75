import { OutOfDomain } from '../../core/bound/out-of-domain.ts';
import { CommandFault } from '../cli/exit-codes.ts';

/**
 * Runs a plan's arithmetic and turns what core refuses into the option it was told by.
 *
 * @param flags core's argument names and the flags they were told by, where they differ
 * @throws CommandFault
 */
export async function planned<T>(flags: Readonly<Record<string, string>>, work: () => T | Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (cause) {
    if (!(cause instanceof OutOfDomain)) throw cause;
    const { argument, value, expected } = cause;
    throw new CommandFault(`--${flags[argument] ?? argument.replace(/[A-Z]/g, (letter) => `-${letter.toLowerCase()}`)} is ${String(value)}, expected ${expected}`);
  }
}
