import { IsEmail, IsString, MaxLength, MinLength } from 'class-validator';

export class SignInForm {
  @IsEmail({}, { message: 'Enter the email that you sign in with, such as name@example.org' })
  email!: string;

  @IsString({ message: 'Enter your password' })
  @MaxLength(200, { message: 'The password is longer than any that Stillair accepts' })
  password!: string;
}

export class FirstAccountForm {
  @IsString({ message: 'Enter your name' })
  @MaxLength(120, { message: 'Shorten the name to 120 characters or fewer' })
  name!: string;

  @IsEmail({}, { message: 'Enter an email, such as name@example.org' })
  @MaxLength(200, { message: 'Shorten the email to 200 characters or fewer' })
  email!: string;

  @IsString({ message: 'Choose a password' })
  @MinLength(10, { message: 'Choose a password of at least 10 characters' })
  @MaxLength(200, { message: 'Choose a password of at most 200 characters' })
  password!: string;

  @IsString({ message: 'Write the password again' })
  passwordAgain!: string;
}
