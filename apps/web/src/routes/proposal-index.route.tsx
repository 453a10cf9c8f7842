import { placeholder } from './placeholder';

export const Component = placeholder('Proposal');
