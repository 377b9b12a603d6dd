/** An isotope as chemists write it: '13C' becomes C with the mass number as a leading superscript. */
export function Isotope({ name }: { name: string }) {
  const [, mass, symbol] = /^(\d+)([A-Z][a-z]?)$/.exec(name) ?? [];
  if (!mass) return <>{name}</>;
  return (
    <span style={{ whiteSpace: 'nowrap' }}>
      <sup style={{ fontSize: '0.72em', lineHeight: 0 }}>{mass}</sup>
      {symbol}
    </span>
  );
}

/** Several isotopes, with spaces between. */
export function Isotopes({ names }: { names: readonly string[] }) {
  return names.map((name, index) => (
    <span key={name}>
      {index > 0 && ' '}
      <Isotope name={name} />
    </span>
  ));
}
