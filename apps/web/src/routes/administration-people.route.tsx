import { placeholder } from './placeholder';

export const Component = placeholder('People and roles');
