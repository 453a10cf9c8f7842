/** A symbol as it is printed: what follows an underscore stands below the line. Other text passes unchanged. */
export function MathSymbol({ text }: { text: string }) {
  const match = /^([^\s_]+)_([^\s_]+)$/.exec(text);
  return match ? (
    <>
      {match[1]}
      <sub style={{ fontSize: '0.75em', lineHeight: 0 }}>{match[2]}</sub>
    </>
  ) : (
    <>{text}</>
  );
}
