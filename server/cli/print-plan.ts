import { planText, type PlanAnswer } from '../plan/plan-answer.ts';

/** Prints a plan for people, or as one line of JSON. */
export function printPlan(answer: PlanAnswer, json: boolean): void {
  process.stdout.write(json ? `${JSON.stringify(answer.json)}\n` : planText(answer));
}
