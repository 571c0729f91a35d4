//! Fields of known currents: near, far, and the power that leaves.
