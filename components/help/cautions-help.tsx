import { CAUTION_KEYS, CAUTIONS } from "./cautions";
import { Part } from "./prose";

export function CautionsHelp() {
  return (
    <>
      <Part title="What comes first" first>
        <p><b>Your local rules and your workshop’s own licensed practice come before anything that stands here or on any screen.</b> Nothing in Twinread is a licence to open, solder or power anything, and nothing in it knows your bench. If a screen and your rules differ, follow the rules and tell your lead.</p>
      </Part>
      {CAUTION_KEYS.map((key) => (
        <Part key={key} title={CAUTIONS[key].title.replace(/\.$/, "")} id={key}><p>{CAUTIONS[key].text}</p></Part>
      ))}
      <Part title="Where these come from">
        <p>They are the common practice of electronics benches, written down from memory and without a source for single figures. Data sheets of your chips and the manual of your reader say more, and say it for your case.</p>
      </Part>
    </>
  );
}
