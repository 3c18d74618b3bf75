import { Command } from 'commander';
import { addAlarmAndBudget } from './plan-alarms.ts';
import { addDemonstrations } from './plan-demonstrations.ts';

const examples = `
How much to inspect, which window to take, how often an alarm setting calls falsely and how late it calls: before it
goes live.

Examples:
  vouchline plan fraction --line '200 ppm' --confidence '95 %' --allowed 1 --rate '50 ppm'
  vouchline plan yield --line '98.5 %' --confidence '95 %'
  vouchline plan rate --line '2 per 100 m' --confidence '99 %'
  vouchline plan lot --lot-size 500 --line '1 %' --confidence '90 %'
  vouchline plan mean --line 1000 --side at-least --mean 1002 --sigma 3 --chance '90 %' --confidence '95 %' --unit ml
  vouchline plan window --line '200 ppm' --normal-rate '50 ppm' --confidence '95 %'
  vouchline plan window --line '2 per 100 m' --normal-rate '0.5 per 100 m' --confidence '95 %'
  vouchline plan window --side at-least --line 1000 --mean 1002 --sigma 3 --confidence '95 %' --unit ml
  vouchline plan window --line '200 ppm' --units 80000 --confidence '95 %'
  vouchline plan alarm --rule window --line '0.1 %' --units 10000 --confidence '99 %' --normal-rate '500 ppm' --per-day 20000
  vouchline plan alarm --rule cusum --line '0.1 %' --ratio 2 --between 1000000 --per-day 20000
  vouchline plan alarm --rule detector --line '0.1 %' --between 1000000 --worse '0.2 %' --worse '0.5 %'
  vouchline plan alarm --rule cusum --line '2 per 100 m' --between 500000 --per-day 20000
  vouchline plan alarm --rule detector --side at-least --line 1000 --mean 1002 --sigma 3 --between 100000
  vouchline plan budget --false-calls 0.5 --stream leak-A=9600 --stream leak-B=9600 --stream final=19000*2

Exit codes: 0 answered, 2 unusable options, 130 cancelled.`;

/** `vouchline plan`: demonstrations, windows, alarm settings and the plant's budget of false calls. */
export function planCommand(): Command {
  const command = new Command('plan').description('plan a demonstration, a window, an alarm setting or the budget of false calls').addHelpText('after', examples);
  addDemonstrations(command);
  addAlarmAndBudget(command);
  return command;
}
