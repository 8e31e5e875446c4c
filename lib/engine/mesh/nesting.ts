/** Whether a component of a part lies inside another: a cavity where it turns against it, a separate solid where it turns the same way. */
export const NESTED_COMPONENT = 'nested_component';
