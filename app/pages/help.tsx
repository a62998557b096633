import { Head, Page } from '../ui/page.tsx';
import { Kbd } from '../ui/kbd.tsx';

/** The short manual, the keys, and what is kept about people. */
export function Component() {
  return (
    <Page>
      <Head
        h1="How a round goes"
        lead="Write, review, answer, settle: each with its time, and nobody learns who wrote or reviewed what."
      />
      <div className="prose grid max-w-[36em] gap-10">
        <Stages />
        <Reviewing />
        <Writing />
        <Points />
        <Privacy />
      </div>
    </Page>
  );
}

function Stages() {
  return (
    <section id="stages">
      <h2>The four stages</h2>
      <p>
        <b>Writing.</b> You derive what the task asks, one line after the other. You see how each line was read, never
        whether it is right. Until writing ends you can take back what you handed in.
      </p>
      <p>
        <b>Reviewing.</b> You get derivations of classmates, without names. In each you look for the first step that
        does not follow, or say that there is none.
      </p>
      <p>
        <b>Answering.</b> You read what your reviewers found, and accept or contest each finding with a reason.
      </p>
      <p>
        <b>Settled.</b> The verdict is shown with evidence that you can check by hand. You can contest it for a week,
        and you can mend your derivation.
      </p>
    </section>
  );
}

function Writing() {
  return (
    <section id="writing">
      <h2>Writing on the sheet</h2>
      <p>
        Type a line as on paper: <Kbd>^</Kbd> for a power, <Kbd>/</Kbd> for a fraction, <code>sqrt</code> for a root.{' '}
        <Kbd>Enter</Kbd> makes the next line, the arrows move between lines and in and out of a field. Everything is
        kept as you type, also without a connection.
      </p>
    </section>
  );
}

function Reviewing() {
  return (
    <section id="reviewing">
      <h2>How to review</h2>
      <ol className="list-decimal pl-6">
        <li>
          Compare each line only with the line above it. Ask: is it worth the same wherever both have a value? For an
          equation: has it the same solutions?
        </li>
        <li>
          Stop at the first step that does not follow. Later steps can be right for the line they were given, and still
          carry the slip.
        </li>
        <li>Mark the step, and the very part that is wrong. Name the kind of slip.</li>
        <li>Write what the line should have been, and why.</li>
        <li>Say how sure you are. Honest sureness earns most in the long run; “can’t tell” costs nothing.</li>
      </ol>
      <p>
        With the keyboard: <Kbd>↑</Kbd> and <Kbd>↓</Kbd> walk the steps, <Kbd>Enter</Kbd> marks one.
      </p>
    </section>
  );
}

function Points() {
  return (
    <section id="points">
      <h2>Points and standings</h2>
      <p>
        A finding earns points by how far it beats an even guess, with your sureness counted (a quadratic score).
        Finding a fault is worth far more than saying that there is none; always saying the same earns nothing or loses.
        While you choose, the screen shows what you would earn and what it could cost.
      </p>
      <p>
        Standings show the upper third of a class under aliases, once a week. Nobody is shown as last, and you can stay
        out of them without losing anything. The checker advises, your teacher decides; rules of your school and local
        law on marks stand above all of this.
      </p>
    </section>
  );
}

function Privacy() {
  return (
    <section id="privacy">
      <h2>What is kept about you</h2>
      <p>
        Your name and your e-mail address or user name, your derivations, findings, answers and points, when they were
        handed in, and who changed what in your class. Teachers of your class see both sides of a review; classmates see
        neither names nor times. Nothing is sent to anybody outside your school, and no page loads anything from
        elsewhere. Ask your teacher or your school for a copy, a correction or a deletion; school rules and local law on
        pupils’ data come first.
      </p>
    </section>
  );
}
