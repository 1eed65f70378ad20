/** Text in which no amount is broken from its minus sign at the end of a line. */
export function Prose({ text }: { text: string }) {
  return text.split(/(\u2212\$?[\d,.]*\d)/).map((part, index) =>
    index % 2 === 1 ? (
      // biome-ignore lint/suspicious/noArrayIndexKey: the parts of one text never move
      <span key={index} className="whitespace-nowrap">
        {part}
      </span>
    ) : (
      part
    ),
  );
}
