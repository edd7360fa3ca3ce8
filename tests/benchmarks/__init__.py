"""Speed and memory, printed as ratios to a floor or a rival measured in the same run; nothing here fails."""
