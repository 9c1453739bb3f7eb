//! Dates. Trading days and holidays live here; prices by date join them with the fits.
