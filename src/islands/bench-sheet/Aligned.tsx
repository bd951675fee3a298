/** A quantity set so that points and units stand under each other down a column: 9.97 MΩ above 11.2 Ω. */
export function Aligned({ text }: { text: string }) {
  const match = /^(−?\d+)(\.\d+)? (\S+)$/.exec(text);
  if (!match) return <span className="aligned aligned-word">{text}</span>;
  const [, whole, fraction = '', unit] = match;
  return (
    <span className="aligned">
      <span className="aligned-whole">{whole}</span>
      <span className="aligned-rest">{fraction}</span>
      <span className="aligned-unit"> {unit}</span>
    </span>
  );
}
