//! pictures
