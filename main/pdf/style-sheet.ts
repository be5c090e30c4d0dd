/** The part of CSS that the figures' styles use: lists of descendant selectors of tags and classes, plain declarations. */

/** What a selector looks at. */
export interface StyledElement {
  readonly name: string;
  readonly classes: ReadonlySet<string>;
}

interface Compound {
  readonly tag: string | undefined;
  readonly classes: readonly string[];
}

interface Rule {
  /** Outermost first; the last is the element itself. */
  readonly compounds: readonly Compound[];
  readonly specificity: number;
  readonly declarations: ReadonlyMap<string, string>;
}

export class StyleSheet {
  readonly #rules: readonly Rule[];

  /** Variables (`var(--ink)`) are replaced by their colours. */
  constructor(source: string, variables: ReadonlyMap<string, string>) {
    const resolved = source.replace(/var\(--([a-z0-9-]+)\)/g, (_, name: string) => variables.get(name) ?? 'none');
    const rules = [...resolved.matchAll(/([^{}]+)\{([^{}]*)\}/g)].flatMap(([, selectors, body]) => {
      const declarations = declarationsOf(body!);
      return selectors!.split(',').map((selector): Rule => {
        const compounds = selector.trim().split(/\s+/).map(compoundOf);
        return { compounds, specificity: specificityOf(compounds), declarations };
      });
    });
    // Stable: of equal weight the later one wins.
    this.#rules = rules.sort((one, other) => one.specificity - other.specificity);
  }

  /** Declarations that hold for the last element of a chain from the root inwards. */
  styleOf(chain: readonly StyledElement[]): Map<string, string> {
    const style = new Map<string, string>();
    for (const { compounds, declarations } of this.#rules) {
      if (!matches(compounds, chain)) continue;
      for (const [property, value] of declarations) style.set(property, value);
    }
    return style;
  }
}

function declarationsOf(body: string): Map<string, string> {
  const declarations = body
    .split(';')
    .map((declaration) => declaration.split(':'))
    .filter((parts) => parts.length === 2)
    .map(([property, value]) => [property!.trim(), value!.trim()] as const);
  return new Map(declarations);
}

function compoundOf(text: string): Compound {
  const [tag, ...classes] = text.split('.');
  return { tag: tag === '' ? undefined : tag, classes };
}

const specificityOf = (compounds: readonly Compound[]): number =>
  compounds.reduce((sum, { tag, classes }) => sum + 100 * classes.length + (tag === undefined ? 0 : 1), 0);

function matches(compounds: readonly Compound[], chain: readonly StyledElement[]): boolean {
  let at = chain.length - 1;
  for (let i = compounds.length - 1; i >= 0; i--) {
    const isOwn = i === compounds.length - 1;
    while (at >= 0 && !fits(compounds[i]!, chain[at]!)) {
      if (isOwn) return false;
      at--;
    }
    if (at < 0) return false;
    at--;
  }
  return true;
}

const fits = ({ tag, classes }: Compound, element: StyledElement): boolean =>
  (tag === undefined || tag === element.name) && classes.every((name) => element.classes.has(name));
