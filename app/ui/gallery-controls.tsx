import { useState } from 'react';
import { Button, LinkButton } from './button.tsx';
import { Checkbox, RadioGroup, Switch } from './choice.tsx';
import { CopyField } from './copy-field.tsx';
import { DateTimeField } from './date-time-field.tsx';
import { FormErrors } from './form-errors.tsx';
import { HowSure } from './how-sure.tsx';
import { Kbd } from './kbd.tsx';
import { Maths } from './maths.tsx';
import { PasswordField, Select, TextArea, TextField } from './text-field.tsx';
import { exampleOutcomes } from './gallery-outcomes.ts';

/** Buttons in every state. */
export function ActionGallery() {
  return (
    <section className="parts-s">
      <h2>Actions</h2>
      <div className="parts-row">
        <Button kind="primary">Hand in</Button>
        <Button kind="primary" data-look="hover">
          Hover
        </Button>
        <Button kind="primary" data-look="active">
          Pressed
        </Button>
        <Button kind="primary" data-look="focus">
          Focus
        </Button>
        <Button kind="primary" busy>
          Handing in…
        </Button>
        <Button kind="primary" disabled>
          Not yet
        </Button>
      </div>
      <div className="parts-row">
        <Button>Second</Button>
        <Button data-look="hover">Hover</Button>
        <Button data-look="active">Pressed</Button>
        <Button data-look="focus">Focus</Button>
        <Button disabled>Not yet</Button>
        <Button kind="grave">Remove from class</Button>
      </div>
      <div className="parts-row">
        <LinkButton to="/parts">A quiet link</LinkButton> <Kbd>Enter</Kbd> <Kbd>↓</Kbd> <Kbd>1</Kbd>
      </div>
    </section>
  );
}

/** Fields in every state. */
export function FieldGallery() {
  const [when, setWhen] = useState<string | null>('2026-10-16T16:00:00.000Z');
  const [sure, setSure] = useState<string | null>('likely');
  return (
    <section className="parts-s">
      <h2>Fields</h2>
      <FormErrors fields={[{ label: 'Class code', message: 'No class has this code.' }]} />
      <div className="parts-cols">
        <TextField label="Empty" placeholder="Name of the task" />
        <TextField label="Filled" defaultValue="Two products" hint="Students see this name." />
        <TextField label="Focus" defaultValue="Two prod" className="focus" />
        <TextField label="Wrong" defaultValue="10 C / D" error="No class has this code. Codes have ten characters." />
        <TextField label="Not open" disabled defaultValue="Set by the school" />
        <Select
          label="Choice"
          options={[
            { value: 'closed', label: 'Closed when writing ends' },
            { value: 'late', label: 'Late batch' },
          ]}
        />
        <PasswordField label="Password" defaultValue="a long sentence" autoComplete="off" />
        <DateTimeField label="Writing ends" value={when} onChange={setWhen} zone="Europe/Berlin" />
        <CopyField label="Class code" value="FENRUT7K3Q" hint="Students type it when they sign up." />
        <TextArea label="Why" hint="At most 500 characters." />
        <RadioGroup
          label="Only one"
          value={sure}
          onChange={setSure}
          options={[
            { value: 'likely', label: 'likely' },
            { value: 'sure', label: 'sure', hint: 'Nothing would change your mind.' },
          ]}
        />
        <div>
          <Checkbox label="Mix in planted derivations" defaultChecked />
          <Checkbox label="Every step must be reversible" />
          <Checkbox label="Set by the school" disabled />
          <Switch label="Show the standings" defaultChecked />
          <Switch label="Show names" />
        </div>
      </div>
      <p className="small muted">Maths: in a line, broken, and marked</p>
      <p className="mt-2">
        Half of <Maths tex="\frac{a+b}{2}h" /> and <Maths tex="\frac{a}{" /> and{' '}
        <Maths tex="2x+10-3x-3" spans={[{ start: 8, end: 10, as: 'marked' }]} />.
      </p>
    </section>
  );
}

/** The slider of sureness. */
export function SureGallery() {
  const [sure, setSure] = useState(5);
  return (
    <section className="parts-s">
      <h2>How sure</h2>
      <div className="max-w-[26rem]">
        <HowSure value={sure} onChange={setSure} outcomes={exampleOutcomes} />
      </div>
    </section>
  );
}
