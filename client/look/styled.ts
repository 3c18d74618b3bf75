import { noChange } from 'lit';
import { directive, Directive, type DirectiveResult, type ElementPart } from 'lit/directive.js';

/**
 * Sets style properties from script. A `style` attribute in a template, also one that holds an expression, is refused
 * by the content security policy the server sends.
 */
class Styled extends Directive {
  render(_properties: Readonly<Record<string, string>>): unknown {
    return noChange;
  }

  override update(part: ElementPart, [properties]: [Readonly<Record<string, string>>]): unknown {
    if (part.element instanceof HTMLElement) {
      for (const [name, value] of Object.entries(properties)) part.element.style.setProperty(name, value);
    }
    return noChange;
  }
}

const make = directive(Styled);
export const styled = (properties: Readonly<Record<string, string>>): DirectiveResult => make(properties);
