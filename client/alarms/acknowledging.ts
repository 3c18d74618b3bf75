import type { ReactiveController } from 'lit';
import type { Actor } from '../access/actor.ts';
import type { WhoDesk } from '../access/who-desk.ts';
import type { Ask } from '../ask.ts';
import type { Desk } from '../desk.ts';
import type { GuaranteeCard } from '../../core/view/guarantee-view.ts';
import type { SettingsDesk } from '../settings.ts';
import { ruleWord } from '../words.ts';
import type { AcknowledgeDialog } from './acknowledge-dialog.ts';
import { AcknowledgeRequest } from './acknowledge-request.ts';

export interface AcknowledgingEnds {
  readonly desk: Desk;
  readonly ask: Ask;
  readonly who: WhoDesk;
  readonly settings: SettingsDesk;
  readonly actor: () => Actor;
  readonly cards: () => readonly GuaranteeCard[];
}

/** Carries out what is asked by `AcknowledgeRequest` below its host: under the known name at once, otherwise it asks who. */
export class Acknowledging implements ReactiveController {
  readonly #host: HTMLElement;
  readonly #ends: AcknowledgingEnds;

  constructor(host: HTMLElement & { addController: (controller: ReactiveController) => void }, ends: AcknowledgingEnds) {
    this.#host = host;
    this.#ends = ends;
    host.addController(this);
  }

  hostConnected(): void {
    this.#host.addEventListener(AcknowledgeRequest.type, this.#onRequest);
  }

  hostDisconnected(): void {
    this.#host.removeEventListener(AcknowledgeRequest.type, this.#onRequest);
  }

  /** Has somebody identify themselves by PIN; the name they act under, or undefined if nobody did. */
  async byPin(what: string, does: string): Promise<string | undefined> {
    await import('../access/pin-dialog.ts');
    const name = await this.#host.shadowRoot?.querySelector('pin-dialog')?.choose(this.#ends.ask, what, does);
    if (name !== undefined) await this.#ends.who.refresh();
    return name;
  }

  readonly #onRequest = (event: Event): void => {
    if (event instanceof AcknowledgeRequest) void this.#acknowledge(event);
  };

  async #acknowledge({ alarm, withNote }: AcknowledgeRequest): Promise<void> {
    const { desk, who, settings } = this.#ends;
    const { named, name: known } = this.#ends.actor();
    const guaranteeName = this.#ends.cards().find((card) => card.id === alarm.guarantee)?.name ?? alarm.guarantee;
    const name = known === '' && named === 'pin' ? await this.byPin(`${guaranteeName}: ${ruleWord[alarm.rule].toLowerCase()}.`, 'Acknowledge') : known;
    if (name === undefined) return;
    const dialog = this.#host.shadowRoot?.querySelector<AcknowledgeDialog>('acknowledge-dialog');
    const send = async (by: string, note: string): Promise<void> => {
      if (named === 'typed') settings.change({ personName: by });
      await desk.acknowledge(alarm.id, by, note);
      if (named === 'pin') await who.refresh(); // acting by PIN lasts from the last act
    };
    await dialog?.begin({ alarm, guaranteeName, name, typed: named === 'typed', send }, name !== '' && !withNote);
  }
}
