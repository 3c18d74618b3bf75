import { OutOfDomain } from '../../core/bound/out-of-domain.ts';
import { CommandFault } from '../cli/exit-codes.ts';
import { badOption } from '../cli/told-figures.ts';
import type { AskedQuantity } from './asked-quantity.ts';
import { boundAnswer, type BoundAnswer } from './bound-answer.ts';
import { fitSentence } from './column-figures.ts';
import { countedBeyond } from './counted-beyond.ts';
import { domainFault, figureOf, type NoFigure } from './figure-of.ts';
import { toldLimit } from './limit-distance.ts';
import { normalRefusal } from './normal-refusal.ts';
import { flagOf, text, type Told } from './told.ts';
import { toldRequest, type ToldRequest } from './told-request.ts';

/** An answer, and why it is not quite the one that was asked for. */
export interface AnswerForPeople {
  readonly answer: BoundAnswer;
  readonly refused: string | undefined;
}

/** @throws CommandFault naming the option, what it held and what was expected */
export async function answerFor(asked: AskedQuantity, told: Told): Promise<AnswerForPeople> {
  const normal = asked.command === 'nonconforming-fraction' && text(told, 'method') === 'normal';
  const request = await toldRequest(asked, normal ? { ...told, method: undefined } : told);
  if (normal) throw refusalOfNormal(asked, request);
  if (asked.command === 'fraction-beyond-limit') {
    const counted = countedInstead(told, request);
    if (counted !== undefined) return counted;
  }
  const figure = figureOf(asked.quantity, request.given, () => request.tail);
  if (!figure.ok) throw faultOf(figure.fault);
  return { answer: boundAnswer(asked, request, figure.value), refused: undefined };
}

function refusalOfNormal({ quantity }: AskedQuantity, request: ToldRequest): CommandFault {
  try {
    return new CommandFault(normalRefusal(request));
  } catch (cause) {
    if (cause instanceof OutOfDomain) return faultOf(domainFault(quantity, cause));
    throw cause;
  }
}

/** The counted answer where it was asked for, or where the measurements speak against the model. */
function countedInstead(told: Told, request: ToldRequest): AnswerForPeople | undefined {
  const method = text(told, 'method') ?? 'normal';
  if (method !== 'normal' && method !== 'counted') throw badOption('method', method, 'normal or counted');
  const { column } = request;
  const limit = toldLimit(told);
  if (column === undefined || limit === undefined) {
    if (method === 'counted') throw new CommandFault('--method counted: expected the measurements (--csv, --column) and a limit (--lsl or --usl)');
    return undefined;
  }
  if (method === 'normal' && column.fit.kind === 'fits') return undefined;
  const { asked, request: counting, figure } = countedBeyond(column, limit, request);
  const refused = method === 'counted' ? undefined : `The normal model is refused. ${fitSentence(column.fit)} Counted instead.`;
  return { answer: boundAnswer(asked, counting, figure), refused };
}

function faultOf({ field, because }: NoFigure): CommandFault {
  if (field === undefined) return new CommandFault(`No bound: ${because}`);
  return new CommandFault(field === 'station' ? `No bound: the station ${because}` : `--${flagOf(field)} ${because}`);
}
