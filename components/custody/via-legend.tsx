const KINDS = [
  ["entry", "by a person or the server"], ["differs", "something differed"], ["signed", "signed or verified"], ["set-aside", "read set aside"],
] as const;

export function ViaLegend() {
  return <ul className="via-legend">{KINDS.map(([kind, words]) => <li key={kind}><span className={`via via-${kind}`} aria-hidden="true"><i /></span><span>{words}</span></li>)}</ul>;
}
