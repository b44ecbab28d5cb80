/** What `oilskin new` writes: a whole scenario that runs, with a word on every key that people ask about. */
export const starterText = `# A scenario of Oilskin. \`oilskin schema > oilskin.schema.json\` lets an editor complete it:
# yaml-language-server: $schema=./oilskin.schema.json
#
# Every quantity carries its unit: 5 mil, 3/32 in, 0.8 mm; 3 W, 34.8 dBm; 10.368 GHz; 16 mm/h; 20 degC.
# A spread may follow: 3 W +/- 0.5 dB. Places and stations below are invented.

title: My hill to the far hill
frequency: 10.368 GHz
polarization: horizontal # or vertical, circular; both ends alike

transmitter:
  power: 1 W # at the transmitter, before the line
  line_loss: 0.5 dB # cable, joints and relay
  dish: tripod
  feed: horn
  cover: film # leave out for a bare mouth

receiver:
  noise_figure: 1.2 dB
  line_loss: 0.2 dB
  mode: [ssb, cw] # cw, ssb, fm, wfm, or one of your own under modes:
  dish: tripod
  feed: horn
  cover: film
  # antenna_temperature: 200 K   a level beam; use 290 K to be cautious

feeds:
  horn:
    return_loss: 16 dB # bare, as measured; or vswr: 1.4
    edge_taper: 10 dB # how far its pattern is down at the dish's rim
    aperture: 46 mm # width of the mouth
    facing: level # up for an offset dish, down, or an elevation such as 30 deg

covers:
  film:
    layers: [{ material: FEP film, thickness: 5 mil }] # feed side first; oilskin materials lists them
  lid:
    layers: [{ material: polycarbonate, thickness: 2 mm }]
    gap: 5 mm # in front of the mouth; dome_radius: 60 mm makes it bulge
    surface: wetting # or beading, mixed
    state: weathered # or new, treated
  unknown sheet: # measured on the bench, with and without
    measured: { insertion_loss: 0.2 dB +/- 0.05 dB, return_loss_change: 2.5 dB }

dish:
  tripod:
    diameter: 60 cm
    focal_ratio: 0.4
    surface_rms: 0.4 mm
    blockage: 6 cm # what stands before the dish
    other_losses: 1 dB # phase of the feed, struts: a small dish loses 1 to 1.5 dB beside
    pointing_error: 0.5 deg # rms in each axis; a hand compass is good to 1 to 5 deg

path:
  from: { name: My hill, latitude: 51.20 N, longitude: 3.10 W, ground: 310 m, height: 2 m }
  to: { name: The far hill, locator: IO82lb35, ground: 480 m, height: 2 m }

weather:
  dry: {}
  shower: { rain: 16 mm/h, extent: 6 km } # wets both covers
  thunderstorm: { rain: 50 mm/h, extent: 4 km, wind: 8 m/s }
  after the shower: { covers_wet_as_at: 5 mm/h } # wet covers, no rain on the path
  # dew: { dew: 0.1 mm }   ice: { ice: 2 mm }   snow: { snow: { depth: 20 mm, wetness: 5 % } }
  # dried_for: 20 min   beside covers_wet_as_at: the time since that rain stopped
  # fog: { fog: 0.5 g/m3, temperature: 5 degC }   0.05 g/m3 is fog of 300 m sight, 0.5 of 50 m

decision: { reserve: 3 dB, confidence: 90 % }
`;
