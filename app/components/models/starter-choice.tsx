import { TextLink } from "~/components/ui/button";
import type { ModelStarter } from "~/utils/model-forms";
import { ChoiceCard } from "./choice-card";

/** With what a model of types begins. */
export function StarterChoice({ start, onChoose }: { start: ModelStarter; onChoose: (start: ModelStarter) => void }) {
  return (
    <fieldset>
      <legend className="mb-1 text-note font-medium text-ink-2">Start with</legend>
      <div className="grid grid-cols-3 gap-3 max-sm:grid-cols-1">
        <ChoiceCard
          name="start"
          value="blank"
          chosen={start}
          onChoose={onChoose}
          title="Nothing"
          about="A blank sheet: add types and members yourself."
        />
        <ChoiceCard
          name="start"
          value="retrofit"
          chosen={start}
          onChoose={onChoose}
          title="Retrofit groups"
          about="A machine type with process, environment, configuration, energy and status, on DI and Machinery."
        />
        <ChoiceCard
          name="start"
          value="signals"
          chosen={start}
          onChoose={onChoose}
          title="A signal list"
          about="Rows of a spreadsheet or a CSV file become members with unit and range."
        />
      </div>
      <p className="mt-2 text-note text-ink-3">
        Or <TextLink to="/models/import">import a NodeSet2 file</TextLink> that you have.
      </p>
    </fieldset>
  );
}
