import type { SourceLedger } from './source-ledger.ts';
import { headOf } from '../record/head-of.ts';
import type { Frame } from '../record/part.ts';
import { tailOf } from '../record/tail-of.ts';

/** A frame that belongs in one place of its source's order: in order, known already, lost before, or beyond a gap. */
export interface Piece {
  readonly kind: 'new' | 'repeat' | 'late' | 'gap';
  readonly frame: Frame;
}

/**
 * Cuts a frame where its records belong in different places of the order: what is sent again comes with whatever
 * neighbours it has now. A part that declares lost what is declared lost already is known.
 *
 * @param ledger what is known of the source before the frame; not changed
 */
export function piecesOf(ledger: SourceLedger, frame: Frame): readonly Piece[] {
  const admission = ledger.place(frame.first, frame.records);
  if (admission.kind === 'new' || admission.kind === 'repeat' || admission.kind === 'gap') return [{ kind: admission.kind, frame }];
  const pieces: Piece[] = [];
  let rest = frame;
  for (const end of edgesIn(ledger, frame)) {
    const piece = headOf(rest, end - rest.first);
    rest = tailOf(rest, end - rest.first);
    pieces.push({ kind: kindOf(ledger, piece), frame: piece });
  }
  return pieces;
}

function kindOf(ledger: SourceLedger, piece: Frame): Piece['kind'] {
  if (piece.first >= ledger.next) return 'new';
  const { kind } = ledger.place(piece.first, piece.records);
  return kind === 'late' && piece.parts[0]?.kind !== 'lost' ? 'late' : 'repeat';
}

/** Sequences at which pieces end, rising; the last is the frame's own end. */
function edgesIn(ledger: SourceLedger, frame: Frame): readonly number[] {
  const end = frame.first + frame.records;
  const edges = new Set([ledger.next, end]);
  for (const { first, last } of ledger.holes) edges.add(first).add(last + 1);
  let sequence = frame.first;
  for (const part of frame.parts) {
    if (part.kind === 'lost') edges.add(sequence).add(sequence + part.records);
    sequence += part.records;
  }
  return [...edges].filter((edge) => edge > frame.first && edge <= end).sort((a, b) => a - b);
}
