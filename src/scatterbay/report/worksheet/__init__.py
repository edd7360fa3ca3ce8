"""The draft worksheet: one HTML file that a qualified expert can check and sign against."""
