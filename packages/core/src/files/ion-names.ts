/** Symbols of the elements (IUPAC), in the order of the table, and D for deuterium. */
const elements = new Set(
  (
    "H D He Li Be B C N O F Ne Na Mg Al Si P S Cl Ar K Ca Sc Ti V Cr Mn Fe Co Ni Cu Zn Ga Ge As Se Br Kr " +
    "Rb Sr Y Zr Nb Mo Tc Ru Rh Pd Ag Cd In Sn Sb Te I Xe Cs Ba La Ce Pr Nd Pm Sm Eu Gd Tb Dy Ho Er Tm Yb Lu " +
    "Hf Ta W Re Os Ir Pt Au Hg Tl Pb Bi Po At Rn Fr Ra Ac Th Pa U Np Pu Am Cm Bk Cf Es Fm Md No Lr " +
    "Rf Db Sg Bh Hs Mt Ds Rg Cn Nh Fl Mc Lv Ts Og"
  ).split(" "),
);

/** Whether a text is the symbol of an element, in its proper case; D counts as one. */
export function isElement(symbol: string): boolean {
  return elements.has(symbol);
}

/** What is wrong with the name of an ion, with what to do; null for an element with or without a charge, `Fe3+`. */
export function ionFault(text: string): { readonly message: string; readonly remedy: string } | null {
  const found = /^([A-Za-z]{1,2})(?:(\d{0,2})([+\-\u2212])|(?:([+\-\u2212])(\d{1,2}))|(\d{1,2}))?$/.exec(text);
  const [, symbol = "", , sign, frontSign, frontCharge, bare] = found ?? [];
  if (found === null)
    return { message: `\`${text}\` is no name of an ion`, remedy: "write the element and its charge, such as Fe3+" };
  if (!elements.has(symbol)) {
    const proper = `${symbol.charAt(0).toUpperCase()}${symbol.slice(1).toLowerCase()}`;
    const remedy = elements.has(proper)
      ? `write ${proper}${text.slice(symbol.length)}`
      : "write the element and its charge, such as Fe3+";
    return { message: `\`${symbol}\` is no element`, remedy };
  }
  if (bare !== undefined) return { message: `the charge of \`${text}\` has no sign`, remedy: `write ${text}+` };
  if (sign === undefined && frontSign !== undefined)
    return {
      message: `the charge of \`${text}\` is written back to front`,
      remedy: `write ${symbol}${frontCharge}${frontSign}`,
    };
  return null;
}
