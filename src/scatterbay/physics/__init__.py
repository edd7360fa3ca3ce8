"""Pure functions on arrays: scattering, attenuation, spectra, dose quantities, and barrier transport."""
