export interface RegisterField {
  name: string;
  /** Highest and lowest bit, inclusive. */
  high: number;
  low: number;
  value?: string | undefined;
  /** Under edit: outlined in the accent. */
  selected?: boolean | undefined;
}

/** A run of bits that is drawn as one box. */
export interface Span {
  kind: 'field' | 'selected' | 'reserved' | 'clash';
  high: number;
  low: number;
  name: string;
  value?: string | undefined;
}

/**
 * Parts a register into boxes from its highest bit down: fields, reserved bits between them, and the bits that more
 * than one field claims.
 */
export function spansOf(fields: readonly RegisterField[], width: number): Span[] {
  const spans: Span[] = [];
  for (let bit = width - 1; bit >= 0; bit -= 1) {
    const next = spanAt(bit, fields);
    const last = spans.at(-1);
    if (last && last.kind === next.kind && last.name === next.name) last.low = bit;
    else spans.push(next);
  }
  return spans;
}

function spanAt(bit: number, fields: readonly RegisterField[]): Span {
  const owners = fields.filter((field) => field.low <= bit && bit <= field.high);
  const [owner] = owners;
  const at = { high: bit, low: bit };
  if (!owner) return { kind: 'reserved', name: '', ...at };
  if (owners.length > 1) return { kind: 'clash', name: owners.map((each) => each.name).join(' and '), ...at };
  return { kind: owner.selected ? 'selected' : 'field', name: owner.name, value: owner.value, ...at };
}

/** What a drawing says in words. */
export function registerSentence(name: string, spans: readonly Span[]): string {
  const clashes = spans
    .filter((span) => span.kind === 'clash')
    .map(({ name: both, high, low }) => {
      return `${both} both claim ${high === low ? `bit ${low}` : `bits ${high} to ${low}`}`;
    });
  const fields = spans.filter((span) => span.kind === 'field' || span.kind === 'selected');
  const parts = fields.map(
    (span) => `${span.name} ${span.high} to ${span.low}${span.value ? ` is ${span.value}` : ''}`,
  );
  return [`${name}: ${parts.join(', ') || 'no fields'}`, ...clashes].join('; ');
}
