import { ApiHeader } from '@nestjs/swagger';

/** For a parameter decorator that reads a header: names the header in the documentation of the route it stands in. */
export function documentsHeader(name: string, description: string, isRequired: boolean): ParameterDecorator {
  return (target, key) => {
    if (key === undefined) return;
    const descriptor = Object.getOwnPropertyDescriptor(target, key);
    if (descriptor === undefined) return;
    ApiHeader({ name, description, required: isRequired, schema: { type: 'string' } })(target, key, descriptor);
  };
}
