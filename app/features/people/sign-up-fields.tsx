import { PASSWORD_MIN } from '../../../shared/schemas/people.ts';
import { PasswordField, TextField, type TextFieldProps } from '../../ui/text-field.tsx';

type OwnProps = Omit<TextFieldProps, 'label' | 'hint' | 'autoComplete'>;

/** The name that somebody without an e-mail address signs in with. */
export function UserNameField(props: OwnProps) {
  return (
    <TextField
      label="User name"
      autoComplete="username"
      autoCapitalize="none"
      spellCheck={false}
      hint="For signing in. Small letters, digits, dots and dashes."
      {...props}
    />
  );
}

interface NewPasswordFieldProps extends OwnProps {
  readonly label?: string;
  /** What else is to be said of it, after how long it has to be. */
  readonly also?: string;
}

/** A password that is being chosen. */
export function NewPasswordField({ label = 'Password', also, ...rest }: NewPasswordFieldProps) {
  const hint = `At least ${PASSWORD_MIN} characters. ${also ?? 'A few words in a row do well.'}`;
  return <PasswordField label={label} autoComplete="new-password" hint={hint} {...rest} />;
}
