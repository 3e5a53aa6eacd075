import { PageTitle } from "@/components/ui/section";
import { HelpTable, Part, See, WidePart } from "./prose";
import { type Topic, type TopicKey, TOPICS } from "./topics";

const STEPS: readonly TopicKey[] = ["request", "identify", "reads", "differ", "approval", "transfer", "custody", "return"];
const rows = (topics: readonly Topic[]) => topics.map(({ key, title, about }) => ({ key, cells: [<See key="to" topic={key}>{title}</See>, about] }));

export function HelpIndex() {
  return (
    <>
      <PageTitle note="How the job is done here, step by step, and what each word and finding means.">Help</PageTitle>
      <Part title="In short">
        <p>A drive only starts on a donor board if its own data comes along, and that sits in one or two small chips on the original board and nowhere else. Here these chips are read several times, the reads are compared, a second person clears one image, it is written to the donor’s chip (or the chip itself is moved), and what is there then is read back and compared again. Every step is written down in a signed log.</p>
        <p>Before your first chip, read the <See topic="cautions">cautions</See> and <See topic="limits">what it does not prove</See>. Your local rules and your workshop’s own licensed practice come before anything that stands here.</p>
        <p>Where a page of the desk says “What is this?” beside a finding, the link leads to its place here. Press <kbd>?</kbd> on the desk for its keys and pages.</p>
      </Part>
      <WidePart title="Step by step">
        <HelpTable caption="Help by step" head={["Page", "About"]} rows={rows(TOPICS.filter(({ key }) => STEPS.includes(key)))} />
      </WidePart>
      <WidePart title="To look things up">
        <HelpTable caption="Help to look up" head={["Page", "About"]} rows={rows(TOPICS.filter(({ key }) => !STEPS.includes(key)))} />
      </WidePart>
    </>
  );
}
