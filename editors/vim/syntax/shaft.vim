" Colours of Layshaft specs. The lists of words are written by the tests of the repository.
if exists('b:current_syntax')
  finish
endif

syntax case match
syntax iskeyword @,48-57,_,192-255

" Names and their parts. What follows below takes precedence.
syntax match shaftName /\v<[[:alpha:]_]\w*>/
syntax match shaftMember /\v\.@<=<[[:alpha:]_]\w*>/

" Reserved words.
syntax keyword shaftLogic
    \ and or not if then else

syntax keyword shaftConstant
    \ true false yes no absent rated

syntax keyword shaftClause
    \ as at with within only because from measured assumed confidence probability points csv each drives

syntax keyword shaftKnownValue
    \ pi standard_gravity

syntax match shaftClause /\v(<only\s+)@<=(in|where)>/
syntax match shaftClause /\v(<not\s+)@<=in>/
syntax match shaftClause /\v<of\s+value>/
syntax match shaftClause /\v<(reduction|increase|teeth)>\ze\s+\w/
syntax match shaftDuty /\v(\=\s*)@<=S(10|[1-9])>/

" Functions before their bracket.
syntax keyword shaftFunction contained
    \ sin cos tan asin acos atan atan2 sqrt cbrt exp ln log10 abs min max floor ceil round

syntax match shaftCall /\v<[[:alpha:]_]\w*\ze\(/ contains=shaftFunction

" Fields before their =.
syntax match shaftField /\v(^\s*|[{;]\s*)@<=([[:alpha:]_]\w*\.)*[[:alpha:]_]\w*\ze\s*\=[^=]/ contains=shaftMember
syntax match shaftField /\v(^\s*|[{;]\s*)@<=gear\s+\w+\ze\s*\=[^=]/ contains=shaftGear
syntax keyword shaftGear gear contained

" Declarations.
syntax keyword shaftDeclaration contained
    \ language title revision use let supply source transmission load drive case require show allow

syntax keyword shaftKind contained
    \ mains battery dc_bus hydraulic_unit compressed_air straight_line straight_line_force dc_motor
    \ series_motor induction_motor induction_circuit servo engine wind_turbine water_turbine hydraulic_motor
    \ pneumatic_motor person measured_curve polynomial constant_speed gear gearbox reversing_gear variable
    \ planetary worm belt chain friction_pulley drum reeving wheel screw rack crank shaft universal_joint
    \ brake freewheel coupling clutch fluid_coupling constant viscous quadratic power_law constant_power fan
    \ pump propeller conveyor cutting work_stroke generator winder hoist off_axis_mass incline vehicle
    \ flywheel

syntax keyword shaftQuantityKind contained
    \ number percentage count grade angle slope length area volume lead displacement time frequency rate
    \ rotational_speed angular_acceleration speed acceleration mass mass_per_length mass_per_area density
    \ force torque energy power mechanical_power electrical_power heat moment_of_inertia flywheel_effect
    \ torsional_stiffness angular_momentum viscous_torque_coefficient quadratic_torque_coefficient
    \ cubic_power_coefficient stiffness viscous_force_coefficient quadratic_force_coefficient
    \ cubic_force_coefficient momentum voltage current resistance inductance capacitance charge
    \ torque_constant series_constant voltage_constant speed_constant force_constant speed_regulation
    \ pressure gauge_pressure absolute_pressure flow mass_flow dynamic_viscosity kinematic_viscosity
    \ temperature temperature_difference temperature_coefficient thermal_resistance thermal_conductance
    \ heat_transfer_coefficient heat_capacity specific_heat_capacity specific_energy specific_consumption
    \ specific_power power_per_area

syntax match shaftPart /\v^\s*(supply|source|transmission|load)\s+\w+\s*:\s*\w+/ contains=shaftDeclaration,shaftKind
syntax match shaftPart /\v^\s*(supply|source|transmission|load)\s+\w+\ze\s*\=/ contains=shaftDeclaration
syntax match shaftValue /\v^\s*let\s+\w+(\s*:\s*\w+)?/ contains=shaftDeclaration,shaftQuantityKind
syntax match shaftSection /\v^\s*(drive|case)\s+\w+/ contains=shaftDeclaration
syntax match shaftOther /\v^\s*(language|title|revision|use|require|show)>\ze\s*["(-]/ contains=shaftDeclaration
syntax match shaftOther /\v^\s*(language|show)>\ze\s+\w/ contains=shaftDeclaration
syntax match shaftAllow /\v(^\s*|[{;]\s*)@<=allow\s+[a-z][a-z0-9-]*/ contains=shaftDeclaration,shaftCode
syntax match shaftCode /\v(allow\s+)@<=[a-z][a-z0-9-]*/ contained

" Numbers, and the unit directly behind.
let s:symbol = '%(hp_electric|short_ton|hp_boiler|long_ton|gal_imp|gal_us|mmH2O|inH2O|inch|thou|krpm|slug|barg|bara|psig|psia|mH2O|degC|degF|[%]|‰|ppm|deg|rev|nmi|mil|min|rpm|rps|mph|g_n|cfm|lbm|kgf|lbf|ozf|psi|atm|cSt|°C|°F|°|in|ft|yd|mi|ha|kn|lb|oz|kp|gf|tf|hp|PS|cP|cd|r|h|d|t|%(T|G|M|k|h|da|d|c|m|μ|µ|u|n|p)?%(Ohm|ohm|Hz|Wh|VA|Pa|Ω|Ah|Wb|m|l|L|g|N|J|W|A|V|H|F|C|T)|%(m)?%(bar|K)|%(m|k)?%(mol)|%(m|μ|µ|u)?%(rad|S)|%(m|μ|µ|u|n|p)?%(s))'
let s:factor = s:symbol . '%(\^-?\d+|[⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+)?'
let s:unit = '%(1/)?' . s:factor . '%([·*/]\(?' . s:factor . '\)?)*'
let s:number = '<\d+%(\.\d+)?%([eE][+-]?\d+)?'
execute 'syntax match shaftNumber /\v' . s:number . '/ nextgroup=shaftUnit skipwhite'
execute 'syntax match shaftUnit /\v' . escape(s:unit, '/') . '\w@!/ contained'
execute 'syntax match shaftColumn /\v\[\s*' . escape(s:unit, '/') . '\s*\]/hs=s+1,he=e-1'
execute 'syntax match shaftShown /\v(<as\s+)@<=' . escape(s:unit, '/') . '\ze\s*($|#|only|not|at)/'

syntax match shaftOperator /\v-\>|→|±|\+\/-|\.\.|[-+*^=<>×·÷≤≥≠]/
syntax match shaftOperator "/"

syntax region shaftString start=/"/ skip=/\\./ end=/"/ oneline contains=shaftEscape
syntax match shaftEscape /\\["\\]/ contained

syntax match shaftComment /#.*$/ contains=@Spell,shaftTodo
syntax match shaftDocumentation /^\s*##.*$/ contains=@Spell

highlight default link shaftDeclaration Keyword
highlight default link shaftLogic Operator
highlight default link shaftClause Statement
highlight default link shaftConstant Constant
highlight default link shaftKnownValue Constant
highlight default link shaftDuty Constant
highlight default link shaftCode Constant
highlight default link shaftFunction Function
highlight default link shaftKind Type
highlight default link shaftQuantityKind Type
highlight default link shaftField Identifier
highlight default link shaftGear Keyword
highlight default link shaftSection Title
highlight default link shaftNumber Number
highlight default link shaftUnit Type
highlight default link shaftColumn Type
highlight default link shaftShown Type
highlight default link shaftOperator Operator
highlight default link shaftString String
highlight default link shaftEscape SpecialChar
highlight default link shaftComment Comment
highlight default link shaftDocumentation SpecialComment

let b:current_syntax = 'shaft'
