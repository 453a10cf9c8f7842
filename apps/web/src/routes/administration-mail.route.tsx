import { placeholder } from './placeholder';

export const Component = placeholder('Outgoing mail');
