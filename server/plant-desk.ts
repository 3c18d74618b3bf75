import { readFile } from 'node:fs/promises';
import { plantFile, plantVersionOf, replacePlantFile, type PlantFileText } from './plant-file.ts';

/** Why a plant file was not put in force: another one is by now, or its file was changed by hand and not read anew. */
export type PutFault = 'another-in-force' | 'changed-by-hand';

/** The plant file in force and its place on disk; changed one after the other. */
export class PlantDesk {
  readonly #path: string;
  readonly #use: (file: PlantFileText, who: string, why: string) => Promise<void>;
  #inForce: { readonly text: string; readonly version: string };
  #last: Promise<unknown> = Promise.resolve();

  /** @param use puts a file in force; durable when it resolves */
  constructor(path: string, inForce: PlantFileText, use: (file: PlantFileText, who: string, why: string) => Promise<void>) {
    this.#path = path;
    this.#inForce = { text: inForce.text, version: inForce.version };
    this.#use = use;
  }

  get inForce(): { readonly text: string; readonly version: string } {
    return this.#inForce;
  }

  /** Writes a file to its place and puts it in force, unless another than `was` stands there. */
  put(file: PlantFileText, was: string, who: string, why: string): Promise<PutFault | undefined> {
    return this.#inTurn(async () => {
      if (this.#inForce.version !== was) return 'another-in-force';
      const onDisk = await readFile(this.#path, 'utf8').catch(() => undefined);
      if (onDisk !== undefined && plantVersionOf(onDisk) !== was) return 'changed-by-hand';
      await replacePlantFile(this.#path, file.text);
      await this.#take(file, who, why);
      return undefined;
    });
  }

  /** Reads the file anew; an invalid one changes nothing. @returns what is wrong with it, empty if it is in force */
  reload(): Promise<readonly string[]> {
    return this.#inTurn(async () => {
      const again = await plantFile(this.#path);
      if (!again.ok) return again.fault;
      if (again.value.version !== this.#inForce.version) await this.#take(again.value, 'server', '');
      return [];
    });
  }

  async #take(file: PlantFileText, who: string, why: string): Promise<void> {
    await this.#use(file, who, why);
    this.#inForce = { text: file.text, version: file.version };
  }

  #inTurn<T>(act: () => Promise<T>): Promise<T> {
    const done = this.#last.then(act);
    this.#last = done.catch(() => undefined);
    return done;
  }
}
