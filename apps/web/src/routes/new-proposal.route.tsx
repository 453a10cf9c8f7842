import { placeholder } from './placeholder';

export const Component = placeholder('A new proposal');
