import { readFileSync } from 'node:fs';
import { Option, type Command } from 'commander';
import { parse } from 'yaml';
import { settingRules, settle, variableOf, BadSetting, type Settings, type SettingRule } from '../settings/settings.ts';
import { CommandFault } from './exit-codes.ts';

/** Gives a command a flag for every setting (or for those named), and one for the settings file. */
export function withSettings(command: Command, only?: readonly SettingRule['key'][]): Command {
  for (const { key, name, help, preset, of } of settingRules) {
    if (only !== undefined && !only.includes(key)) continue;
    const option = new Option(`--${name} <${of.kind === 'whole' ? 'number' : of.kind === 'choice' ? of.of.join('|') : 'text'}>`, `${help} [${variableOf(name)}${preset === undefined ? '' : `, default: ${preset}`}]`);
    command.addOption(option);
  }
  return command.option('--settings <file>', 'settings file (YAML or JSON), names as the flags');
}

/** The settings a command was told: flags before variables before the file before presets. */
export function toldSettings(command: Command): Settings {
  const flags = command.opts<Record<string, unknown>>();
  const byName: Record<string, unknown> = {};
  for (const { key, name } of settingRules) byName[name] = flags[key];
  try {
    return settle(byName, process.env, fileSettings(flags['settings']));
  } catch (cause) {
    if (cause instanceof BadSetting) throw new CommandFault(cause.message);
    throw cause;
  }
}

function fileSettings(path: unknown): Record<string, unknown> {
  if (typeof path !== 'string') return {};
  let tree: unknown;
  try {
    tree = parse(readFileSync(path, 'utf8'));
  } catch (cause) {
    throw new CommandFault(`settings file ${path}: ${(cause as Error).message}`);
  }
  if (typeof tree !== 'object' || tree === null || Array.isArray(tree)) throw new CommandFault(`settings file ${path}: expected names and values`);
  return tree as Record<string, unknown>;
}
