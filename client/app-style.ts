import { css } from 'lit';

export const appStyle = css`
  :host { display: block; min-height: 100vh; padding: 0 1.35rem 1rem; }
  .skip { position: absolute; left: 1rem; top: -4rem; z-index: 10; background: var(--raised); padding: 0.5rem 1rem; border-radius: 5px; }
  .skip:focus { top: 0.6rem; }
  main:focus { outline: none; }
  main.stale { filter: grayscale(1); }
  .nowhere, .waiting { padding: 2rem; }
  .nowhere h1, .waiting h1 { font-size: 1.4rem; margin-bottom: 0.6rem; }
  @media (max-width: 760px) { :host { padding: 0 0.6rem 1.5rem; } }
`;
