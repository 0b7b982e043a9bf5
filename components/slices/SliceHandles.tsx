// Where there is no pointer (native, tests); the web build takes SliceHandles.web.tsx.
export const SliceHandles = () => null;
