package main

const helpShelf = `A shelf is a TOML file that lists what a place has. With --shelf an order need
not name its presentations; what it names must be there.

  [shelf]
  name = "Theatre 2"                       all three optional
  invented = true                          demonstration data
  needle_dead_space = "0.05 mL"            warns where it counts

  [[stock]]                                at least one
  drug = "ephedrine"
  presentation = "ampoule 30 mg in 1 mL"   as the formulary writes it
  count = 10                               optional; left out: as many as are needed

  [[barrel]]                               at least one
  size = "10 mL"
  step = "0.5 mL"                          optional; left out: the usual graduation
  dead_space = "0.1 mL"                    optional; counted off where an order asks for hours

  [[diluent]]                              optional; left out: whatever is listed is at hand
  name = "sodium chloride 0.9 %"
  container = "ampoule"                    ampoule, vial, bag, bottle or syringe
  volume = "10 mL"
  count = 20

  [[pump]]                                 optional; left out: pumps take 20 mL and more
  name = "pump on the trolley"
  takes = ["20 mL", "50 mL"]

Of all ways to make a syringe that nothing refuses, the planner takes the one

  1. whose drawn volume stands on a line and fills a fifth of its barrel;
  2. of the fewest containers; sizes of one strength may be opened together;
  3. that leaves least, all of it in one container;
  4. of the fewest sizes of container;
  5. of the fewest acts: nothing to dissolve, nothing to dilute;
  6. that stands first on the shelf.

A volume is measured in a barrel of which it fills a fifth or more, on the line
that is nearest, in the smallest such barrel. The giving syringe is the smallest
that holds the final volume, has a line there, and fits a pump on the list. What
one syringe takes is gone for the next. --explain tells what lost, and why.
`
