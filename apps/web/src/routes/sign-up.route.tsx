import { placeholder } from './placeholder';

export const Component = placeholder('Sign up');
