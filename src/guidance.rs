//! Published exposure limits as data, and how an exposure is judged by them.
