/** On every page of a demo: nobody may take invented work for real work, or the other way round. */
export function DemoStrip() {
  return (
    <aside aria-label="Demo" className="demo-strip bg-caution-wash px-8 py-1 text-t2 text-ink phone:px-4">
      <b>Demo.</b> Invented customers and boards. Real work starts with <code>DEMO=0</code>.
    </aside>
  );
}
