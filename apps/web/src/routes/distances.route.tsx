import { placeholder } from './placeholder';

export const Component = placeholder('Distances and dimming');
