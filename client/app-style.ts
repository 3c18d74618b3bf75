import { css } from 'lit';

export const appStyle = css`
  :host { display: block; min-height: 100vh; padding: 0 1.35rem 1rem; }
  .skip { position: absolute; left: 1rem; top: -4rem; z-index: 10; background: var(--raised); padding: 0.5rem 1rem; border-radius: 5px; }
  .skip:focus { top: 0.6rem; }
  main:focus { outline: none; }
  main.stale { filter: grayscale(1); }
  .fault { color: var(--harm); font-weight: 600; padding-bottom: 0.6rem; }
  .fault:empty { display: none; }
  .withdrawn { min-height: 100vh; display: grid; place-content: center; grid-template-columns: minmax(0, 34em); gap: 0.8em; padding: 1rem; font-size: clamp(1.1rem, 1.5vw, 2.6rem); }
  .withdrawn h1 { font-size: 1.7em; }
  account-page, people-page, displays-page, sources-page, changes-page { max-width: 78rem; margin-inline: auto; }
  .nowhere, .waiting { padding: 2rem; }
  .nowhere h1, .waiting h1 { font-size: 1.4rem; margin-bottom: 0.6rem; }
  @media (max-width: 760px) { :host { padding: 0 0.6rem 1.5rem; } }
`;
