//! The laws and conventions behind the results.

use crate::diagnostic::registry::{Entry, Law};

pub(super) const ENTRIES: &[Entry] = &[
    Law {
        equation: "contact: G = ∫ h dA;   node to node: R = (T̄₁ − T̄₂)/Q;   \
                   added by the joint: R = R(path) − R(path, perfect contact);   \
                   source to sink: R = (T̄_source − T̄_sink)/Q",
        range: "all results belong to the stated source and sink; spreading-limited values do not \
                scale with the number of bolts",
        source: "definitions of this program",
    }
    .entry(
        "law/planes",
        "Which result enters which model",
        [
            "Four numbers are called joint resistance, and they differ a hundredfold. `contact` is \
             the sum of local conductance with both faces at one temperature each, an upper bound \
             of conductance: 382 W/K for four M5 at 5 kN between two 80 × 80 × 5 mm aluminium plates. \
             `node to node` stands between the mean temperatures of the two whole plates. `added by \
             the joint` is what the joint costs against perfect contact: 0.278 K/W for the same \
             plates in vacuum. `source to sink` is the whole path from heated zone to sink surface. In a \
             stack of more than two plates `contact` is the series of its interfaces, 1/G = Σ 1/G_i; \
             `node to node` stands between the first and the last plate; the drop across the faces \
             is the sum over all interfaces; perfect contact is perfect in all of them.",
            "Meshed model with its own plates: give its faces the local h, or `contact` on the area \
             that touches; it makes its own spreading. Thermal network with one node per plate: \
             `node to node`. Requirement of kelvins at watts: `source to sink`, at the unfavourable \
             end. `added by the joint` tells what a better joint could gain; put into a meshed \
             model it counts the spreading twice. For a hot case take low conductance, for heat \
             leaking into the cold or an isolating mount take high.",
        ],
    ),
    Law {
        equation: "T = T_run + F (P/2π + 0.577 μ_t d₂ + μ_h D_m/2)",
        range: "60° threads, bolt elastic; the exact helix gives 0.3 % (μ 0.08) to 0.9 % (μ 0.30) more \
                torque",
        source: "VDI 2230; checked against its printed tables of 2001 (fine thread: force within \
                 0.34 %, torque within 0.84 %)",
    }
    .entry(
        "law/torque",
        "Torque to clamp force",
        [
            "The torque lifts the load along the thread (pitch P), rubs in the thread (pitch diameter \
             d₂) and under the turned head (mean diameter D_m). Running torque of a locking feature \
             comes first and clamps nothing.",
            "State friction of thread and head with a range; the class of VDI 2230 is the \
             fallback.",
        ],
    ),
    Law {
        equation: "F = (T − T_run) / (K d)",
        range: "the lubricant, plating and size that K was measured with; K falls as torque rises",
        source: "textbook form; at equal friction 0.15 it returns K = 0.194 to 0.202 (M6 to M20, 1/4-20)",
    }
    .entry(
        "law/nut-factor",
        "Nut factor",
        [
            "One number K stands for pitch and both frictions; d is the nominal diameter. Published \
             values run from 0.10 (oiled) to 0.50 (stainless on stainless, dry), and 0.20 is what people \
             take when they do not know.",
            "Use it when K was measured on the stack, with its range. Friction coefficients say \
             more.",
        ],
    ),
    Law {
        equation: "σ_eq = √(σ² + 3 τ²),   σ = F/A₀,   τ = 12 M_t/(π d₀³) (thread fully plastic in torsion)",
        range: "tightening alone; stress diameter d₀ = d − 0.9382 P (metric), D − 0.9743 P (inch)",
        source: "VDI 2230, editions from 2001 on (plastic torsion; its tables are reproduced within \
                 1 %); older tables reckon with elastic torsion and lie 5 to 10 % lower",
    }
    .entry(
        "law/strength-use",
        "How much of the bolt's strength tightening uses",
        [
            "The equivalent stress of tension and of the torque that the thread takes up, running \
             torque included, over the yield strength. The high value stands at lowest friction and \
             upper torque tolerance.",
            "Keep the high value below 0.9 for tightening by torque. External loads come on top and \
             are not in it.",
        ],
    ),
    Law {
        equation: "F_Z = f_Z / (δ_S + δ_P)",
        range: "pressures below the limit of every seat; M4 and larger; all-metal joints",
        source: "VDI 2230, table of guide values for f_Z and cone of δ_P, from memory",
    }
    .entry(
        "law/settling",
        "Clamp force lost to settling",
        [
            "Roughness in thread, seats and interfaces flattens by f_Z, 8 to 11 µm for two plates. The \
             loss is that times the stiffness of the joint: long slender bolts lose least. δ_S and δ_P \
             are the resiliences of bolt and plates.",
            "Acts in the low force by default and in the nominal one when `[losses]` asks for it. \
             Measured values replace it.",
        ],
    ),
    Law {
        equation: "c = b + t_e tan φ,   p = p₀ (1 − x^α)^β,   x = (r − a)/(c − a),   ∫ p dA = F",
        range: "t_e/b 0.15 to 4, b/a 1.25 to 2.6, thickness ratio up to 6, ratio of moduli 1/3 to 3; flat \
                faces, uniform head pressure, no friction between the faces",
        source: "fitted to 43 axisymmetric finite-element solutions made for this program: c within \
                 4 %, ring sum within 0.6 %",
    }
    .entry(
        "law/cone",
        "How far the clamp force spreads",
        [
            "Beneath a head of radius b the pressure between the plates reaches a radius c and falls \
             to zero there. No fixed angle is right: from head edge to contact edge it is 16 to 24° \
             up to a thickness of 0.8 b, 32° at 2 b and 39° at 4 b. The 45° of old texts belongs to \
             glued plates. a is the hole radius, t_e the effective thickness of unequal plates.",
            "`--field cone` takes it, for a quick look; a half-angle of your own or the angle of VDI 2230 \
             can be chosen for comparison. The field solved for the whole joint, which is taken \
             otherwise, is `law/elastic-contact`.",
        ],
    ),
    Law {
        equation: "J(u) = ½ uᵀK u − fᵀu + Σ w_i ½ κ ⟨−g_i⟩² → least,   g = g₀ + w_upper − w_lower,   p = κ ⟨−g⟩;   \
                   bare faces: κ = 10¹⁵ Pa/m;   layer: κ = M/t, M = E(1 − ν)/((1 + ν)(1 − 2ν)) where it cannot \
                   bulge, ≈ E where it can",
        range: "linear elasticity, small displacements, first loading; pressures below the yield of the \
                plates, closure of a layer below half of its thickness; faces slide freely or stick where \
                they touch",
        source: "semismooth Newton steps are those of a primal-dual active set: Hintermüller, Ito and \
                 Kunisch 2003, SIAM J. Optim. 13, 865-888; columns and grid are a construction of this \
                 program, checked against solutions in three dimensions made for it",
    }
    .entry(
        "law/elastic-contact",
        "Elastic contact of the whole joint",
        [
            "Plates, feet and ribs are solid bodies on a grid of columns, clamped by heads, nuts and \
             threads. Faces press and never pull: where the gap g would be negative they touch with \
             pressure p, elsewhere they stand apart. ⟨x⟩ is x where positive and 0 elsewhere, g₀ the gap \
             before any force, w the deflection of each face and w_i the area of a column. Between flat \
             faces the contact does not grow with the force, and pressure and gap follow it in \
             proportion. A filler of known modulus M and thickness t is a bed of springs that does \
             not pull; pastes and fluids flow away and leave bare faces.",
            "It is taken unless `--field cone` is given; `--resolution` sets the grid. Radii that hold a share of the \
             force converge best, the contact area slowest. Heads that press uniformly or as rigid \
             bodies, sliding or stuck faces and hard or yielding asperities are choices of `[contact]`; the \
             other choice enters low and high.",
        ],
    ),
    Law {
        equation: "g₀ = Σ over both faces;   bow: |h| (r/R)² convex, h (1 − (r/R)²) concave;   map: highest − \
                   height(x, y);   sag: bow of height κ R²/2, κ = ±α q″/k or \
                   6 (α₂ − α₁) ΔT (1 + m)²/(t [3 (1 + m)² + (1 + mn)(m² + 1/(mn))])",
        range: "smooth shapes, small against the plate; sag of plates free to bend, at room-temperature \
                data; a shift or a tilt of a whole plate is no gap",
        source: "bow: definition of this program; flux: even gradient in a free plate; bimetal: Timoshenko \
                 1925, from memory",
    }
    .entry(
        "law/initial-gap",
        "Faces that are not flat before they are bolted",
        [
            "Bow, flatness map and thermal sag of both faces add to the gap that the bolts have to \
             close. r is the distance from the centre of the outline, R half its diagonal (of a disc \
             its radius), h the height of the bow; κ is a curvature, positive where the faying face \
             is hollow. A heat flux q″ hollows the warm plate and domes the cold one; a second layer \
             (index 2; m = t₁/t₂, n = E₁/E₂, t = t₁ + t₂) bends its plate when the temperature changes by ΔT. \
             With such a gap contact grows with the force, so every force is solved anew.",
            "State `bow`, `flatness_map` or `sag` of a plate. `flatness` alone has no shape: nominal is \
             flat, low and high take it as a bow either way. The cone knows none of this.",
        ],
    ),
    Law {
        equation: "h σ/(k_s m) = √f exp(−λ²/2) / (2√(2π) (1 − √(½ f erfc(λ/√2)))^1.5),   \
                   λ = √2 erfc⁻¹(2P/(f H_ep)),   H_ep = 2.76 S_f/√(1 + (6.5/ε)²),   ε = 1.67 E′ m/S_f",
        range: "any pressure up to half the hardness; flat rough faces, first loading",
        source: "Sridhar & Yovanovich 1996, from memory; the exact form and its published fit agree \
                 within 4 % for ε 0.5 to 1000",
    }
    .entry(
        "law/elastic-plastic",
        "Solid spots, elastic to plastic",
        [
            "Smooth, hard faces touch elastically, rough soft ones plastically, and many sets lie \
             between. This law passes from one to the other without a step, so it is the default. \
             The flow stress S_f of the surface layer is H_c/2.76 with the same microhardness as \
             in the plastic law, not the yield strength of the catalogue.",
            "Keep it unless a paper or a requirement names another law.",
        ],
    ),
    Law {
        equation: "h = 1.25 k_s (m/σ) (P/H_c)^0.95;   exact: λ = √2 erfc⁻¹(2P/H_c), \
                   h σ/(k_s m) = exp(−λ²/2) / (2√(2π) (1 − √(P/H_c))^1.5)",
        range: "fit: P/H_c 10⁻⁶ to 0.02, within 1.4 % of the exact integral; the integral is used at any \
                pressure",
        source: "Yovanovich 1982; formula read in the Mechanical Engineers' Handbook, 3rd ed., vol. 4, \
                 pp. 374-375; its range and the exact form from memory",
    }
    .entry(
        "law/plastic",
        "Solid spots, plastic",
        [
            "The peaks of the rougher face sink into the softer one until the true area carries the \
             load at the microhardness H_c. k_s is the harmonic mean conductivity; σ and m are \
             roughness and slope of both faces in quadrature.",
            "The classic choice for blasted, ground and milled metal.",
        ],
    ),
    Law {
        equation: "h = 1.25 k_s (m/σ) (P/H_c)^0.95 at any pressure",
        range: "checked for P/H_c up to 0.02; 4, 7 and 11 % low at 0.05, 0.08 and 0.11",
        source: "Yovanovich 1982, as for law/plastic",
    }
    .entry(
        "law/plastic-power",
        "Solid spots, plain power law",
        [
            "The published fit of the plastic law, without the exact integral at high pressure.",
            "For comparison with papers and other reckonings alone.",
        ],
    ),
    Law {
        equation: "h = 1.55 k_s (m/σ) (P/H_e)^0.94,   H_e = E′ m/√2;   exact: λ = √2 erfc⁻¹(4P/H_e), \
                   h σ/(k_s m) = exp(−λ²/2) / (4√π (1 − √(P/H_e))^1.5)",
        range: "fit: P/H_e 10⁻⁵ to 10⁻², within 2 % of the exact integral",
        source: "Mikic 1974, from memory; fit and exact form agree",
    }
    .entry(
        "law/elastic",
        "Solid spots, elastic",
        [
            "The peaks flatten elastically; hardness does not enter, but the moduli of both faces \
             do: 1/E′ = (1 − ν₁²)/E₁ + (1 − ν₂²)/E₂. Fits lapped hard faces and contacts that have been \
             loaded before.",
            "Use it to see how much the mode of deformation matters.",
        ],
    ),
    Law {
        equation: "m = 0.125 σ^0.402,   σ in µm;   σ = √(σ₁² + σ₂²),   m = √(m₁² + m₂²)",
        range: "Rq 0.216 to 9.6 µm (range from memory)",
        source: "correlation of published profiles, formula read second hand; other rules differ by \
                 1.9 to 2.8",
    }
    .entry(
        "law/slope",
        "Slope of the asperities from roughness",
        [
            "Conductance is proportional to slope, which drawings never state. The rule guesses it \
             from Rq, face by face, with a factor 1.4 either way (one standard deviation, a judgement).",
            "State a measured slope; it also depends on the sampling interval of the instrument.",
        ],
    ),
    Law {
        equation: "P/H_c = [P / (c₁ (1.62 σ′/m)^c₂)]^(1/(1 + 0.071 c₂)),   σ′ in µm",
        range: "materials with measured c₁ and c₂; others use 1.08 HV times a factor 1.0 to 1.6",
        source: "form read in a journal paper of 2004; exponent and the table of c₁, c₂ from memory \
                 (Hegazy 1985)",
    }
    .entry(
        "law/microhardness",
        "Hardness at the size of a contact spot",
        [
            "Machining hardens the outermost microns, and spots are so small that they meet this \
             layer. Measured Vickers microhardness c₁ d^c₂ is taken at the size of the spots.",
            "For aluminium and annealed copper no coefficients were found: the bulk Vickers value \
             is used and its factor enters the spread.",
        ],
    ),
    Law {
        equation: "h_g = k_g/(Y + M) to first order;   Y = √2 σ erfc⁻¹(2P/H);   \
                   M = ((2−α₁)/α₁ + (2−α₂)/α₂) · 2γ/((1+γ) Pr) · Λ",
        range: "any gas pressure down to vacuum; where faces part, the gap is their separation plus Y; at \
                zero load Y is that of P/H = 10⁻⁶ (an assumption)",
        source: "simple form and M read in published work; integral over the heights after Yovanovich, \
                 DeVaal & Hegazy 1982, from memory",
    }
    .entry(
        "law/gas-gap",
        "Gas in the gaps",
        [
            "Gas conducts over the mean distance Y of the rough faces, lengthened by M because \
             molecules exchange heat badly with a wall (accommodation α) and fly a free path Λ, which \
             grows as 1/p. Below about 100 Pa conductance is proportional to pressure.",
            "Between the bolts this is most of the heat in air: see `service/air-flatters-vacuum`.",
        ],
    ),
    Law {
        equation: "h_r = 4 ε σ_B T³,   1/ε = 1/ε₁ + 1/ε₂ − 1",
        range: "grey diffuse faces close together, small temperature drop",
        source: "textbook form, read in two places; 6.124 W/(m²·K) for black faces at 300 K",
    }
    .entry(
        "law/radiation",
        "Radiation across the gap",
        [
            "Where faces part in vacuum they still radiate to each other. Bare metal of emissivity 0.1 \
             makes 0.3 W/(m²·K) at 300 K: next to nothing beside a contact, but all there is without \
             one, and strong above 600 K.",
            "State emissivities for black or anodised faces.",
        ],
    ),
    Law {
        equation: "h = k/Y beside the solid spots",
        range: "liquids without particles that fill the gaps",
        source: "gap conductance with M = 0, from memory",
    }
    .entry(
        "law/fluid",
        "Oil or unfilled grease",
        [
            "The liquid replaces the gas in the gaps of the rough faces and conducts six to eight times \
             better; the metal spots remain.",
            "For greases with particles use a paste: particles hold the faces apart.",
        ],
    ),
    Law {
        equation: "R = t/k + 1/h;   1/h = Σ 1/h_i over both faces;   h_i = 1.25 k_i (m_i/σ_i)(P/H)^0.95, H of the \
                   foil, P/H at most 1",
        range: "foil much softer than both faces and thicker than their roughness; P up to H, above the \
                boundaries are held",
        source: "plastic law of Yovanovich 1982 with the hardness of the foil, Yovanovich 1972, both from memory; \
                 indium on aluminium within a factor of two of Incropera's table 3.2 (memory)",
    }
    .entry(
        "law/foil",
        "Soft foil that yields",
        [
            "`model = \"foil\"`: the asperities of both faces sink into a foil of indium or graphite, whose hardness \
             then decides instead of theirs. Each boundary falls nearly in proportion to the pressure until the foil \
             flows; beside the contact the foil lies loose, and the medium alone crosses. A table of the catalogue \
             knows neither the roughness nor pressures beyond its last point.",
            "Choose a thin foil that is thicker than both roughnesses together; harder foils (graphite, lead, tin) \
             need more pressure.",
        ],
    ),
    Law {
        equation: "BLT = 1.31·10⁻⁴ m (τ_y/P)^0.166,   R″ = BLT/k + (σ₁ + σ₂)/(2k)",
        range: "0.1 to 1 MPa; not thinner than the largest particles, not thicker than applied",
        source: "Prasher 2001 and 2002, constants from memory",
    }
    .entry(
        "law/paste",
        "Paste with particles",
        [
            "A paste yields at τ_y, so its bond line falls slowly with pressure: 42 µm at 100 kPa and \
             28 µm at 1 MPa for 100 Pa. Between the bolts it stays as thick as applied, or as the gap.",
            "Apply thinly. With paste, more torque can make the joint worse: the gap between the \
             bolts opens with force.",
        ],
    ),
    Law {
        equation: "t/d < 1: H′ = H_s (1 − t/d) + 1.81 H_l t/d;   to 4.90: H′ = 1.81 H_l − 0.21 H_l (t/d − 1);   \
                   above: H′ = H_l",
        range: "soft metal on a harder base; t layer thickness, d depth of indentation",
        source: "Antonetti & Yovanovich 1985, rule from memory; 61 measured points of silver on nickel \
                 scatter by 12.6 % RMS",
    }
    .entry(
        "law/plating",
        "Platings and films",
        [
            "A soft plating lets the faces sink into each other; a thick one also conducts for \
             itself. Vapour-deposited indium of 2 to 3 µm on aluminium raised conductance eightfold, \
             lead of about 2 µm fivefold, most at low pressure. A hard or insulating film adds its t/k \
             in series and its own hardness to the contact.",
            "Watch vacuum (cadmium, zinc, tin) and corrosion; more than a few microns gain nothing.",
        ],
    ),
    Law {
        equation: "q = (T₁ − T₂) / (1/h + t₁/3k₁ + t₂/3k₂) from ring to ring, radial links 2π k t / ln(r₊/r₋)",
        range: "one bolt in round plates; upper bound of resistance for the given pressure field, up \
                to the ring error (10⁻⁴ at 100 rings)",
        source: "complementary energy: the flux behind it is admissible; measured +0.5, +3 and +7 % \
                 (median) at Biot numbers 0.1, 1 and 10",
    }
    .entry(
        "law/ring-network",
        "Rings between two round plates",
        [
            "Both plates are cut into rings; each ring pair exchanges heat across the joint and with \
             its neighbours. Because every such flow is a possible one, the true resistance cannot be \
             higher than this.",
            "Read it with `law/lower-bound`: the truth lies between, for the field used.",
        ],
    ),
    Law {
        equation: "1/R ≤ 1/(R_1D + 1/G) + G_shank",
        range: "isothermal or uniformly heated outer faces; G holds contact, gas and radiation, the shank stands beside",
        source: "Rayleigh's monotonicity: forcing a surface to one temperature can only lower resistance",
    }
    .entry(
        "law/lower-bound",
        "Lower bound of the resistance",
        [
            "If both faying faces had one temperature each, no heat would need to spread, and the \
             path would be the plates straight through (R_1D) and the ring sum G in series.",
            "Bounds hold for the pressure field that was used; they do not hold its own error.",
        ],
    ),
    Law {
        equation: "q (1/h + z₁/3 + z₂/3) + q_t z₁/6 + q_b z₂/6 = T₁ − T₂,   z = t/k",
        range: "several bolts; plates thin against the distance between bolts",
        source: "construction of this program (axial flux linear through each plate); 6 and 10 % high \
                 on two joints solved in three dimensions",
    }
    .entry(
        "law/cell",
        "Several bolts on one plan grid, and their cells",
        [
            "Every grid cell holds one mean temperature per plate; in-plane flux k t, interface flux \
             through the local conductance and the thickness terms. Each bolt's cell, the part of \
             the plates nearer to it than to any other bolt, is cut into rings for the ring sum and \
             for the draws; the draws follow the cells and stand on the grid.",
            "See `resistance/cell` for what it leaves out, and `law/conduction` for the plates in full.",
        ],
    ),
    Law {
        equation: "∇·(k ∇T) = 0 in every plate;   q = h(p, g) (T_upper − T_lower) where they meet;   \
                   k ∂T/∂n = heat flux at the source, film or fixed temperature at the sink",
        range: "steady; one conductivity for each plate in each case; no heat through sides and holes but \
                where a source, a sink or a bolt says so",
        source: "Fourier's law; polynomials through every layer on the columns of the contact are a \
                 construction of this program, checked against exact solutions and against solutions in \
                 three dimensions made for it",
    }
    .entry(
        "law/conduction",
        "Heat through the whole joint in three dimensions",
        [
            "With the elastic field heat runs through the plates on the columns that carry their \
             contact. Each piece of the faces conducts by its own pressure p, or by its own gap g where it \
             stands open: spots, gas, radiation, filler and film as their laws tell. Perfect contact is \
             the same plates with one temperature on both sides wherever the faces could touch. Bolts join \
             the seats of head and nut or thread as strands.",
            "The error told is the difference to the next coarser grid. A small heated zone, an edge \
             that is cooled, feet and ribs are part of the solution, and no rule of the plan grid \
             (`law/cell`) is used.",
        ],
    ),
    Law {
        equation: "F = 4E/(1−ν²) · t⁴/(K₁ D_e²) · s/t [(h₀/t − s/t)(h₀/t − s/2t) + 1];   \
                   δF + s(F) = δF₀ + s(F₀) + Δl",
        range: "discs without contact flats (up to about 6 mm thick), h₀ at most √2 t, no friction; \
                15 to 75 % of the height",
        source: "Almen & Laszlo 1936 as in DIN EN 16984 (from memory); checked against printed forces of \
                 DIN 2093 series A within 0.6 % and against an integral of the strain",
    }
    .entry(
        "law/disc-spring",
        "Disc springs in the clamp",
        [
            "s is the deflection, t the thickness, h₀ the cone, D_e the outer diameter and K₁ a factor of \
             D_e/D_i. Nested discs add force, sets head to head add deflection. In the clamp the springs \
             follow what settles or contracts (Δl) along their curve, so that the bolt keeps its force; flat \
             springs follow no more.",
            "State `disc_springs`. Choose them so that the nominal clamp force lies near 75 % of the force at \
             flat, and enough sets that their travel is several times what is lost. A flat washer between \
             them and a soft plate spares the plate. Heat through the shank has to pass the springs: where that \
             path matters, `shank_path = false` leaves it out.",
        ],
    ),
    Law {
        equation: "Φ = n δ_P/(δ_S + δ_P);   F_S = F + Φ F_A;   F_K = F − (1 − Φ) F_A;   \
                   σ = √(σ² + 3 (τ/2)²) ≤ R_p",
        range: "load along the bolt, pulling; no prying, no bending, no fatigue; n between 0 and 1",
        source: "VDI 2230 (Φ from its resilience, worked by hand in the tests; half torsion from memory); \
                 factor 1.2 against separation of NASA-STD-5020, from memory",
    }
    .entry(
        "law/axial-load",
        "Load along the bolts",
        [
            "Of a load F_A the bolt takes the share Φ and the faces lose the rest. n tells where the load \
             enters: near the heads (1) the bolt takes more, near the faces (0) less. Where n is not stated, \
             each side is judged at its worst end: the bolt with n = 1, the clamp with n = 0.",
            "State `axial_load` with its range, its cases and `introduction` where it is known. A load that does \
             not act while heat flows is stated with `lasting = false`.",
        ],
    ),
    Law {
        equation: "F = F_assembly (1 − r)(1 − i)",
        range: "i = 5 % on bare or pasted faces, 10 % on a soft layer, 0 for one bolt; in the low force alone \
                unless [losses] is stated",
        source: "judgement; flanges on soft gaskets lose 20 to 40 % in a single pass (from memory)",
    }
    .entry(
        "law/interaction",
        "Bolts tightened one after another",
        [
            "Each bolt presses the plates a little further and takes force from those tightened before it.",
            "Tighten crosswise from the middle, in passes to a third, two thirds and all of the torque, then \
             once round at full torque, and again after settling. State `losses.interaction` where it was \
             measured on the stack.",
        ],
    ),
    Law {
        equation: "σ_seat = (1 − 2ν)/2 · F/A;   σ_bend = 4 E t h/((1 − ν) L²);   \
                   σ_seat + σ_bend ≤ strength/3",
        range: "rounded seats; a thin plate pressed flat from a dish h over its shorter side L",
        source: "Hertz contact (Johnson, from memory) and plate theory; the factor 3 is judgement",
    }
    .entry(
        "law/brittle",
        "What a brittle plate bears",
        [
            "Beside the edge of a pressed seat the surface is in tension; pressing a plate flat bends it. Both \
             are added, which is on the safe side, and held against a third of the strength in bending.",
            "State `flexural_strength` of the plate; then it limits the torque as well.",
        ],
    ),
    Law {
        equation: "window = {T: R_u(T) meets the requirement} ∩ [T_separation, T_strength];   \
                   knee: 1/R_added(T) = 0.9/R_added(T_best)",
        range: "torques swept; R_u is the unfavourable end of the band: 95 % of the draws at 90 % confidence",
        source: "definitions of this program; ends found between the rows, checked against fine sweeps",
    }
    .entry(
        "law/torque-window",
        "The torque window",
        [
            "Heat asks for force, strength forbids too much, separation and losses too little. The knee tells \
             where tightening has given nine tenths of what it can: the joint's own conductance, 1/R added by \
             the joint, reaches 90 % of that at the best torque.",
            "Tighten inside the window, near its middle where the tool is coarse. Where none is left, the \
             limits named tell which side to move; changes that were worked through are told with their windows. It \
             is no torque card: codes and a responsible engineer decide.",
        ],
    ),
];
