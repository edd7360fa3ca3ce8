"""Plane barriers by adding and doubling: any layers, any angle, resolved in energy and angle.

The method is published: H. C. van de Hulst, Multiple Light Scattering (1980), chapter 4; G. N. Plass,
G. W. Kattawar and F. E. Catchings, Appl. Opt. 12 (1973) 314. Photons are counted by the number that crosses a
plane; rows of every matrix are what comes in, columns what goes out, both ordered by falling energy.
"""
