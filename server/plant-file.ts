import { createHash, randomUUID } from 'node:crypto';
import { open, readFile, rename } from 'node:fs/promises';
import { dirname } from 'node:path';
import type { PlantFault } from '../core/plant/plant-fault.ts';
import type { Plant } from '../core/plant/plant.ts';
import { readPlant } from '../core/plant/read-plant.ts';
import { fault, ok, type Result } from '../core/result.ts';

/** A plant file from disk that passed every check. */
export interface PlantFileText {
  readonly text: string;
  /** First 16 hexadecimal digits of the text's SHA-256. */
  readonly version: string;
  readonly plant: Plant;
}

export function plantVersionOf(text: string): string {
  return createHash('sha256').update(text).digest('hex').slice(0, 16);
}

/** Reads and checks a plant file; an unreadable file is a fault like any other. */
export async function plantFile(path: string): Promise<Result<PlantFileText, readonly string[]>> {
  let text: string;
  try {
    text = await readFile(path, 'utf8');
  } catch (cause) {
    return fault([`The plant file ${path} cannot be read: ${(cause as Error).message}`]);
  }
  const read = plantText(text);
  return read.ok ? read : fault(read.fault.map((one) => faultLine(path, one)));
}

/** Checks a plant file's text. */
export function plantText(text: string): Result<PlantFileText, readonly PlantFault[]> {
  const version = plantVersionOf(text);
  const reading = readPlant(text, version);
  return reading.ok ? ok({ text, version, plant: reading.value.plant }) : fault(reading.fault);
}

/** Puts a text in place of a plant file: the old one or the new one is there, whatever happens on the way. */
export async function replacePlantFile(path: string, text: string): Promise<void> {
  const beside = `${path}.${randomUUID()}.new`;
  const file = await open(beside, 'w', 0o600);
  try {
    await file.writeFile(text);
    await file.sync();
  } finally {
    await file.close();
  }
  await rename(beside, path);
  const folder = await open(dirname(path), 'r');
  try {
    await folder.sync(); // The new name is on disk, too.
  } finally {
    await folder.close();
  }
}

const faultLine = (path: string, { line, column, sentence }: PlantFault): string => `${path}:${line}:${column}: ${sentence}`;

/** Reads a plant file that was checked when it was let in (from the journal). */
export function plantOfChecked(text: string, version: string): Plant {
  const reading = readPlant(text, version);
  if (!reading.ok) throw new Error(`the stored plant file ${version} does not read any more: ${reading.fault[0]?.sentence ?? ''}`);
  return reading.value.plant;
}
