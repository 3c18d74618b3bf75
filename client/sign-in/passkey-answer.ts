import { browserSupportsWebAuthn, startAuthentication, startRegistration, WebAuthnError } from '@simplewebauthn/browser';

type RequestOptions = Parameters<typeof startAuthentication>[0]['optionsJSON'];
type CreationOptions = Parameters<typeof startRegistration>[0]['optionsJSON'];

/** Has this device or a key sign what the server asks. @throws Error with a sentence for a person */
export const passkeyAnswer = (options: object): Promise<object> => inWords(() => startAuthentication({ optionsJSON: options as RequestOptions }));

/** Has this device or a key make a passkey for the server. @throws Error with a sentence for a person */
export const newPasskey = (options: object): Promise<object> => inWords(() => startRegistration({ optionsJSON: options as CreationOptions }));

async function inWords(ceremony: () => Promise<object>): Promise<object> {
  if (!browserSupportsWebAuthn()) throw new Error('this browser has no passkeys, or the page did not come over HTTPS');
  try {
    return await ceremony();
  } catch (cause) {
    throw new Error(wordsOf(cause), { cause });
  }
}

function wordsOf(cause: unknown): string {
  if (cause instanceof WebAuthnError && cause.code === 'ERROR_AUTHENTICATOR_PREVIOUSLY_REGISTERED') return 'this device or key is registered for the account already';
  if (cause instanceof WebAuthnError && (cause.code === 'ERROR_INVALID_DOMAIN' || cause.code === 'ERROR_INVALID_RP_ID')) return 'passkeys do not hold at this address; open the plant’s own address';
  const name = cause instanceof Error ? cause.name : '';
  return name === 'NotAllowedError' || name === 'AbortError' ? 'the passkey was not given, or not in time' : `the passkey failed: ${cause instanceof Error ? cause.message : String(cause)}`;
}
