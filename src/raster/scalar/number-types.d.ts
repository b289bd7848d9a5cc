/** Number types of AssemblyScript, so that the kernel's scalar part is one source for both of its languages. */
declare type i32 = number;
declare type f32 = number;
