import { Icon } from "@/components/ui/icon";
import { withCommas } from "@/lib/core/quantity";
import type { MatrixView, ReadBackView } from "@/lib/views";

const SORT_FROM = 5;

/** From five reads on agreeing ones stand together, the largest group first; else the order of reading is kept. */
export function agreeingOrder(matrix: MatrixView): number[] {
  const order = matrix.reads.map((_, i) => i);
  if (order.length < SORT_FROM) return order;
  const groups: number[][] = [];
  for (const i of order) {
    const group = groups.find(([first]) => matrix.cells[first][i] === 0);
    if (group) group.push(i);
    else groups.push([i]);
  }
  return groups.sort((a, b) => b.length - a.length).flat();
}

function Cell({ value }: { value: number | "other-size" | null }) {
  if (value === null) return <td className="self"><span className="sr-only">itself</span></td>;
  if (value === 0) return <td className="equal"><Icon name="equal" size={18} label="equal" className="align-middle" /></td>;
  if (value === "other-size") return <td className="differ"><span className="font-face text-t1">other size</span></td>;
  return <td className="differ"><span className="sr-only">differ in </span>{withCommas(value)}<span className="sr-only"> bytes</span></td>;
}

/** Reads by reads; reads set aside are not in it. */
export function AgreementMatrix({ matrix }: { matrix: MatrixView }) {
  if (matrix.reads.length < 2) return null;
  const order = agreeingOrder(matrix);
  return (
    <table className={`matrix ${order.length >= SORT_FROM ? "matrix-many" : ""}`}>
      <caption>Differing bytes between each two reads</caption>
      <thead>
        <tr><td className="corner" />{order.map((i) => <th key={i} scope="col">{matrix.reads[i].name}</th>)}</tr>
      </thead>
      <tbody>
        {order.map((row) => (
          <tr key={row}><th scope="row">{matrix.reads[row].name}</th>{order.map((column) => <Cell key={column} value={matrix.cells[row][column]} />)}</tr>
        ))}
      </tbody>
    </table>
  );
}

/** After the write: each counted read-back against the approved image. */
export function ReadBackMatrix({ backs }: { backs: ReadBackView["backs"] }) {
  return (
    <table className={`matrix ${backs.length >= SORT_FROM ? "matrix-many" : ""}`}>
      <caption>Differing bytes against the approved image</caption>
      <thead>
        <tr><td className="corner" />{backs.map(({ name }) => <th key={name} scope="col">{name}</th>)}</tr>
      </thead>
      <tbody>
        <tr><th scope="row">Approved</th>{backs.map(({ name, differs }) => <Cell key={name} value={differs} />)}</tr>
      </tbody>
    </table>
  );
}
