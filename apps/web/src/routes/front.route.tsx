import { placeholder } from './placeholder';

export const Component = placeholder('Front page');
