//! A bracketed root finder and a quadrature, each with its accuracy stated. Implemented in this file's children.
