//! Configuration factors: closed forms and the contour integral.
