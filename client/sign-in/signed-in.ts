/** Somebody came in at one of the doors. */
export class SignedIn extends Event {
  static readonly type = 'vouchline-signed-in';

  constructor() {
    super(SignedIn.type, { bubbles: true, composed: true });
  }
}
