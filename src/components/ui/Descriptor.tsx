import { descriptorParts, descriptorText } from '#lib/format/descriptors';

interface Props {
  /** As the interface writes it: LAeq, LAFmax, Lden, LA10. */
  name: string;
  /** Averaging time in words: "15 min". */
  window?: string;
}

/** A typeset descriptor; screen readers get its plain form. The twin of Descriptor.astro. */
export function Descriptor({ name, window }: Props) {
  const { symbol, subscript } = descriptorParts(name, window);
  return (
    <span className="whitespace-nowrap">
      <span aria-hidden="true">
        {symbol}
        <sub>{subscript}</sub>
      </span>
      <span className="sr-only">{descriptorText(name, window)}</span>
    </span>
  );
}
