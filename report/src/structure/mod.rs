//! Structures on the host: SMILES and Molfile/SDF in, the core's molecular graph out.
