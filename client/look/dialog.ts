import { css } from 'lit';

export const dialog = css`
  dialog {
    width: min(30rem, calc(100vw - 1.5rem)); border: 1px solid var(--edge); border-radius: 10px; padding: 1.2rem 1.3rem 1.3rem;
    background: var(--sheet); color: var(--ink); font-size: 1.05rem; overflow-wrap: anywhere;
  }
  dialog::backdrop { background: rgb(10 14 17 / 0.5); }
  dialog h2 { font-size: 1.25rem; }
  dialog .does { display: flex; gap: 0.6rem; justify-content: flex-end; flex-wrap: wrap; }
  dialog .does .first { flex: 1 1 12rem; min-height: 3rem; }
`;
