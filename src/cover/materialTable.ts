/**
 * The materials of covers as plain tables, read by `materials.ts`. "-" stands for a figure that does not apply or is
 * not known. Riddle et al. 2003: Riddle, Baker-Jarvis, Krupka 2003, IEEE Trans. MTT 51, 727, as listed in a university
 * compilation of permittivities. Von Hippel: Dielectric Materials and Applications, 1954.
 */

/** Permittivity and loss tangent (value, low, high), where they hold, and whence they come. */
export const electricalTable = `
name | permittivity | low | high | loss tangent | low | high | GHz | degC | confidence | source
PTFE sheet | 2.08 | 2.02 | 2.12 | 0.0003 | 0.0002 | 0.0006 | 10 | 25 | published | Riddle et al. 2003: 2.05/0.0002 at 10 GHz, 2.04/0.0004 at 11.5 GHz; Pozar, Microwave Engineering, after von Hippel (from memory): 2.08/0.0004
PTFE expanded (radome laminate) | 1.25 | 1.2 | 1.3 | 0.0005 | 0.0001 | 0.001 | 10 | 25 | partly published | Koller, Ediss, Kerr, ALMA Memo 309; loss from memory
PTFE thin tape or film with adhesive | 2.3 | 2.05 | 2.6 | 0.003 | 0.0005 | 0.01 | 10 | 25 | estimate | PTFE with 20-40 % of adhesive 2.8 as layers in series
FEP film | 2.05 | 2.01 | 2.1 | 0.0008 | 0.0005 | 0.0012 | 10 | 25 | memory | from memory
ETFE film | 2.4 | 2.3 | 2.6 | 0.009 | 0.005 | 0.013 | 10 | 25 | memory | from memory
PVDF sheet or film | 2.9 | 2.5 | 3.5 | 0.06 | 0.03 | 0.11 | 10 | 25 | memory | from memory, wide
polyimide film | 3.3 | 3.0 | 3.5 | 0.008 | 0.002 | 0.015 | 10 | 23 | memory | from memory; dependence on humidity: Sawada et al. 2024 at 10 GHz
rigid PVC (uPVC) | 2.75 | 2.65 | 3.0 | 0.006 | 0.005 | 0.01 | 10 | 25 | published | Riddle et al. 2003: 2.71/0.006 at 11 GHz
plasticised PVC (vinyl sheet or tape) | 2.8 | 2.6 | 3.3 | 0.03 | 0.015 | 0.07 | 10 | 25 | memory | from memory, wide; softer grades lose more
acrylic (PMMA) | 2.6 | 2.55 | 2.7 | 0.007 | 0.005 | 0.01 | 10 | 25 | published | Riddle et al. 2003: 2.61/0.01 at 11 GHz; von Hippel (from memory): 2.59/0.0067
polycarbonate | 2.77 | 2.7 | 2.95 | 0.0055 | 0.004 | 0.007 | 10 | 25 | partly published | Riddle et al. 2003: 2.76 at 11 GHz; the loss printed there, 0.0005, is taken as a slip for 0.005
ABS (moulded) | 2.7 | 2.5 | 2.9 | 0.008 | 0.005 | 0.012 | 11 | 25 | published | Riddle et al. 2003: 2.7/0.008 at 11 GHz
ABS (3-D printed) | 2.55 | 2.3 | 2.8 | 0.008 | 0.005 | 0.015 | 10 | 25 | published range | Zechmeister, Lacik 2019: printed plastics 2.55-2.95 up to 10 GHz; value from memory
ASA | 2.8 | 2.5 | 3.1 | 0.01 | 0.006 | 0.018 | 10 | 25 | memory | from memory
PETG | 2.65 | 2.4 | 2.9 | 0.01 | 0.006 | 0.02 | 10 | 25 | published range | Zechmeister, Lacik 2019: printed plastics 2.55-2.95 up to 10 GHz; value from memory
PLA (3-D printed) | 2.65 | 2.3 | 2.95 | 0.01 | 0.006 | 0.025 | 10 | 25 | published range | Zechmeister, Lacik 2019: printed plastics 2.55-2.95 up to 10 GHz; value from memory
HDPE | 2.34 | 2.28 | 2.4 | 0.0003 | 0.0002 | 0.0006 | 11 | 25 | published | Riddle et al. 2003: 2.37/0.0002 at 11.3 GHz; Seeger: 2.34 up to 40 GHz
LDPE film or sheet | 2.26 | 2.2 | 2.3 | 0.0004 | 0.0002 | 0.0008 | 10 | 25 | memory | Pozar, Microwave Engineering, after von Hippel (from memory): 2.25/0.0004
UHMWPE | 2.32 | 2.28 | 2.36 | 0.0003 | 0.0001 | 0.0006 | 10 | 25 | memory | from memory
polypropylene | 2.26 | 2.2 | 2.3 | 0.0003 | 0.0001 | 0.0008 | 9.4 | 25 | published | Riddle et al. 2003: 2.27/0.0001 at 9.4 GHz
polystyrene (rigid, crosslinked) | 2.54 | 2.5 | 2.57 | 0.0005 | 0.0003 | 0.0009 | 10.7 | 25 | published | Riddle et al. 2003: 2.54/0.0005 at 10.7 GHz; Pozar, Microwave Engineering, after von Hippel (from memory): 2.54/0.00033
high-impact polystyrene sheet | 2.51 | 2.497 | 2.522 | 0.0008 | 0.00079 | 0.00081 | 10 | 23 | published | split-post resonator report of a university metrology laboratory, 0.236 mm sheet
expanded polystyrene 15-30 kg/m3 | 1.025 | 1.015 | 1.05 | 0.0002 | 0.00005 | 0.0007 | 10 | 25 | memory | Pozar, Microwave Engineering, after von Hippel (from memory): foam 1.03/0.0001 at 3 GHz; scaled by Looyenga's mixing rule
extruded polystyrene foam 28-45 kg/m3 | 1.045 | 1.03 | 1.07 | 0.0004 | 0.0001 | 0.001 | 10 | 25 | memory | from memory; scaled by Looyenga's mixing rule
PET film | 3.0 | 2.8 | 3.25 | 0.008 | 0.003 | 0.015 | 10 | 25 | memory | from memory
silicone rubber | 3.0 | 2.8 | 3.4 | 0.012 | 0.003 | 0.03 | 10 | 25 | memory | from memory
epoxy/glass FR-4 or G10 | 4.3 | 4.0 | 4.7 | 0.02 | 0.012 | 0.03 | 10 | 25 | memory | from memory
fused silica | 3.8 | 3.78 | 3.85 | 0.0001 | 0.00005 | 0.0004 | 10 | 25 | memory | Pozar, Microwave Engineering, after von Hippel (from memory): 3.78/0.0001
borosilicate glass | 4.6 | 4.4 | 4.85 | 0.008 | 0.004 | 0.012 | 10 | 25 | memory | Pozar, Microwave Engineering, after von Hippel (from memory): 4.82/0.0054 at 3 GHz
soda-lime window glass | 6.7 | 6.0 | 7.5 | 0.018 | 0.01 | 0.025 | 10 | 25 | memory | from memory
PTFE-coated glass fabric | 2.8 | 2.4 | 3.3 | 0.004 | 0.001 | 0.01 | 10 | 25 | memory | from memory
ripstop nylon cloth dry | 1.9 | 1.5 | 2.6 | 0.012 | 0.006 | 0.03 | 10 | 25 | estimate | solid polyamide of Riddle et al. 2003, 3.01/0.02 at 10.8 GHz, at 50-70 % fill by Looyenga's mixing rule
acrylic pressure-sensitive adhesive | 2.8 | 2.5 | 3.3 | 0.03 | 0.01 | 0.06 | 10 | 25 | memory | from memory, wide
hot-melt (EVA) | 2.45 | 2.3 | 2.7 | 0.008 | 0.004 | 0.02 | 10 | 25 | memory | from memory
ice | 3.184 | 3.16 | 3.20 | 0.0003 | 0.0001 | 0.001 | 10 | -5 | model | Matzler & Wegmuller 1987, Hufford 1991
dry snow 0.3 g/cm3 | 1.53 | 1.48 | 1.57 | 0.0001 | 0.00005 | 0.0005 | 10 | -5 | model | Ulaby & Long 2014
wet snow 0.3 g/cm3 5 % water | 1.91 | 1.8 | 2.1 | 0.156 | 0.12 | 0.2 | 10.4 | 0 | model | Hallikainen, Ulaby, Abdelrazik 1986
water | 52.3 | 40.7 | 62.0 | 0.73 | 0.49 | 1.0 | 10.368 | 10 | model | double Debye of ITU-R P.840; low and high at 0 and 25 degC
`;

/**
 * Life outdoors: class of sunlight, water taken up in 24 h of immersion (ASTM D570, ISO 62; from memory unless
 * named), service temperatures, contact angle of water on a clean new surface, and how that surface wets.
 */
export const weatherTable = `
name | UV | uptake % | min degC | max degC | contact angle deg | wetting | source | notes
PTFE sheet | A | 0.01 | -200 | 260 | 109 | beading | published mean of contact angles; supplier data | density sets the permittivity: skived film and extruded rod differ by 2 %
PTFE expanded (radome laminate) | A | 0.01 | -200 | 260 | 120 | beading | from memory | soft; a worn skin lets rain in
PTFE thin tape or film with adhesive | A | 0.01 | -70 | 200 | 109 | beading | published mean of contact angles | better as two layers, film and adhesive, where both thicknesses are known
FEP film | A | 0.01 | -100 | 205 | 108.5 | beading | published mean of contact angles; supplier data | -
ETFE film | A | 0.03 | -100 | 150 | 96 | beading | supplier data; angle from memory | beads weakly
PVDF sheet or film | A | 0.04 | -40 | 150 | 89 | mixed | published mean of contact angles; supplier data | a relaxation lies at microwaves: the loss changes fast with temperature
polyimide film | C | 1.8 | -200 | 260 | 75 | wetting | from memory | permittivity and loss rise with the humidity of the air; sun erodes the surface
rigid PVC (uPVC) | B | 0.05 | -20 | 60 | 85.6 | mixed | published mean of contact angles; supplier data, which differ: 60 or 80 degC | pigment and filler raise the permittivity; impact-modified outdoor grades last
plasticised PVC (vinyl sheet or tape) | C | 0.4 | -20 | 60 | 80 | wetting | from memory; supplier data on cracking in sun | plasticiser leaches out; the glue of a tape is one more layer
acrylic (PMMA) | A | 0.3 | -50 | 90 | 70.9 | wetting | published mean of contact angles; supplier data | -
polycarbonate | B | 0.15 | -130 | 125 | 82 | mixed | published mean of contact angles; supplier data | yellows without a layer against UV
ABS (moulded) | C | 0.3 | -40 | 80 | 80.9 | mixed | published mean of contact angles; supplier data, uptake 0.05-1.8 % | chalks and turns brittle in sun
ABS (3-D printed) | C | 0.5 | -40 | 80 | 80.9 | mixed | published mean of contact angles | voids of air lower the permittivity
ASA | A | 0.25 | -40 | 85 | 85 | mixed | supplier data | -
PETG | B | 0.2 | -40 | 70 | 75 | wetting | supplier data | -
PLA (3-D printed) | C | 0.5 | -10 | 50 | 75 | wetting | from memory | softens in full sun or a parked car; dye can add loss (Picha et al. 2022)
HDPE | B | 0.01 | -50 | 75 | 96 | beading | published mean of contact angles; supplier data, which differ: 75 or 105 degC | beads weakly; carbon black against UV adds loss: measure it
LDPE film or sheet | C | 0.01 | -50 | 80 | 96 | beading | published mean of contact angles; supplier data | beads weakly
UHMWPE | C | 0.01 | -150 | 80 | 94 | beading | supplier data: low against UV unless black | beads weakly
polypropylene | C | 0.01 | 0 | 100 | 102.1 | beading | published mean of contact angles; supplier data | cracks within a season of sun unless stabilised
polystyrene (rigid, crosslinked) | C | 0.05 | -20 | 70 | 87.4 | mixed | published mean of contact angles; supplier data | -
high-impact polystyrene sheet | C | 0.07 | -20 | 70 | 87.4 | mixed | published mean of contact angles | -
expanded polystyrene 15-30 kg/m3 | D | 3.0 | -50 | 75 | 87 | mixed | from memory | soaks between the beads, and that water rules when wet: paint it or bag it
extruded polystyrene foam 28-45 kg/m3 | D | 0.3 | -50 | 75 | 87 | mixed | from memory | turns to dust in sunlight
PET film | C | 0.5 | -60 | 105 | 72.5 | wetting | published mean of contact angles | anisotropic
silicone rubber | A | 0.1 | -60 | 180 | 107.2 | beading | published mean of contact angles; supplier data | its beading recovers; filler rules the loss; collects dust
epoxy/glass FR-4 or G10 | C | 0.1 | -60 | 130 | 76.3 | wetting | published mean of contact angles (epoxy) | -
fused silica | A | 0 | -200 | 900 | 15 | wetting | from memory | -
borosilicate glass | A | 0 | -80 | 230 | 14 | wetting | published table of 2011: glass 13.6 deg | -
soda-lime window glass | A | 0 | -40 | 100 | 14 | wetting | published table of 2011: glass 13.6 deg | -
PTFE-coated glass fabric | A | 0.05 | -70 | 250 | 109 | beading | published mean of contact angles; supplier data | its beading lasts; effective value of a coated cloth of 0.1-1 mm
ripstop nylon cloth dry | C | 3.0 | -40 | 90 | 65 | wetting | published mean of contact angles: polyamides 62.6 and 68.3 deg | soaks: a wet cloth holds a film of its own thickness, so add a water layer
acrylic pressure-sensitive adhesive | C | 1.0 | -30 | 100 | 75 | - | from memory | usual layer 25-50 micrometre
hot-melt (EVA) | C | 0.1 | -20 | 60 | 90 | - | from memory | creeps in sun
ice | - | - | - | - | 20 | - | from memory | impurities raise the loss
dry snow 0.3 g/cm3 | - | - | - | - | - | - | - | -
wet snow 0.3 g/cm3 5 % water | - | - | - | - | - | - | - | -
water | - | - | - | - | - | - | - | strong dependence on temperature
`;

/** Other words under which a material is asked for. */
export const aliasTable = `
name | aliases
PTFE sheet | PTFE, PTFE foil, PTFE film, polytetrafluoroethylene
PTFE expanded (radome laminate) | expanded PTFE, ePTFE
PTFE thin tape or film with adhesive | PTFE tape
FEP film | FEP, FEP foil, FEP sheet
ETFE film | ETFE, ETFE foil
PVDF sheet or film | PVDF, PVDF film, PVDF sheet
polyimide film | polyimide, polyimide tape
rigid PVC (uPVC) | uPVC, PVC, PVC-U, rigid PVC
plasticised PVC (vinyl sheet or tape) | vinyl, vinyl tape, vinyl sheet, soft PVC, PVC tape
acrylic (PMMA) | acrylic, PMMA, acrylic sheet, acrylic glass
polycarbonate | PC, polycarbonate sheet
ABS (moulded) | ABS, ABS sheet
ABS (3-D printed) | printed ABS
PETG | printed PETG, PETG sheet
ASA | printed ASA, ASA sheet
PLA (3-D printed) | PLA, printed PLA
HDPE | PE-HD, high-density polyethylene
LDPE film or sheet | LDPE, PE-LD, LDPE film, LDPE sheet, polyethylene film, polythene, PE film, low-density polyethylene
UHMWPE | PE-UHMW, UHMW polyethylene
polypropylene | PP, polypropylene sheet
polystyrene (rigid, crosslinked) | polystyrene, PS
high-impact polystyrene sheet | HIPS, high-impact polystyrene
expanded polystyrene 15-30 kg/m3 | EPS, expanded polystyrene, EPS foam, bead foam
extruded polystyrene foam 28-45 kg/m3 | XPS, extruded polystyrene, XPS foam
PET film | PET, polyester film, PET sheet
silicone rubber | silicone
epoxy/glass FR-4 or G10 | FR-4, G10, glass epoxy, epoxy/glass
fused silica | quartz glass, fused quartz
borosilicate glass | borosilicate
soda-lime window glass | glass, window glass, soda-lime glass, float glass
PTFE-coated glass fabric | PTFE glass cloth, PTFE-coated glass cloth, coated glass fabric
ripstop nylon cloth dry | ripstop nylon, nylon cloth, ripstop
acrylic pressure-sensitive adhesive | adhesive, acrylic adhesive, tape adhesive
hot-melt (EVA) | hot-melt, hot glue, EVA
dry snow 0.3 g/cm3 | dry snow
wet snow 0.3 g/cm3 5 % water | wet snow
`;
