import { FormControl, FormGroup, type ValidatorFn } from '@angular/forms';
import { mailTroubles, type MailField } from '@shared/contract/mail-rules';
import { mailFormSchema, type MailForm, type MailSettings } from '@shared/contract/set-up';
import { field, says } from '../common/field';

export const MAIL_LABELS = {
  host: 'Server',
  port: 'Port',
  security: 'Security',
  user: 'User',
  password: 'Password',
  from: 'Sender’s address',
} as const;

export const SECURITY_CHOICES = [
  { value: 'starttls', words: 'STARTTLS (port 587)' },
  { value: 'tls', words: 'TLS (port 465)' },
  { value: 'none', words: 'none: letters and password go readable' },
] as const;

/** The port that usually goes with a security. */
export const USUAL_PORTS: Readonly<Record<MailForm['security'], number>> = {
  starttls: 587,
  tls: 465,
  none: 25,
};

/** What is done with the password that is kept: it is never shown, so an empty field would say too little. */
export type PasswordWill = 'keep' | 'new' | 'none';

export type MailFormGroup = ReturnType<typeof mailForm>;

/** The form of mail settings as they are. Without a server the rest may be empty. */
export function mailForm(settings: MailSettings) {
  const shape = mailFormSchema.shape;
  return new FormGroup({
    host: field(shape.host, settings.host ?? '', [together('host')]),
    port: field<number | null>(shape.port, settings.port),
    security: field<MailForm['security']>(shape.security, settings.security),
    user: field(shape.user, settings.user, [together('user')]),
    password: new FormControl('', {
      nonNullable: true,
      validators: [
        says<string>((password, { parent }) =>
          password === '' && parent?.get('will')?.value === 'new' ? 'Type the new password.' : '',
        ),
      ],
    }),
    will: new FormControl<PasswordWill>(settings.hasPassword ? 'keep' : 'new', { nonNullable: true }),
    from: field(shape.from, settings.from, [together('from')]),
  });
}

/** What the form says; null: something is not right yet. */
export function mailOf(form: MailFormGroup): MailForm | null {
  const { will, password, ...rest } = form.getRawValue();
  const read = mailFormSchema.safeParse({
    ...rest,
    user: rest.user.trim(),
    ...(will === 'keep' ? {} : { password: will === 'none' ? '' : password }),
  });
  return read.success && form.valid ? read.data : null;
}

function together(of: MailField): ValidatorFn {
  return says<string>((_value, { parent }) => {
    const form = parent as MailFormGroup | null;
    if (!form) return '';
    const { host, user, from, will } = form.getRawValue();
    return mailTroubles({ host: host.trim(), user: user.trim(), from }, will !== 'none')[of] ?? '';
  });
}
