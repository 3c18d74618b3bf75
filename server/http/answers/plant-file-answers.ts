import * as v from 'valibot';
import type { PlantFault } from '../../../core/plant/plant-fault.ts';
import { text, whole } from './answer-parts.ts';
import type { Sent } from './sent.ts';

const fault: v.GenericSchema<Sent<PlantFault>> = v.strictObject({ line: whole, column: whole, field: text, found: text, expected: text, sentence: text });

export const plantFileAnswer = v.strictObject({ text, version: text });
export const checkAnswer = v.strictObject({ faults: v.array(fault), version: v.optional(text) });
export const versionAnswer = v.strictObject({ version: text });
