# Layshaft specs in Kakoune: colours, comments, indentation. The lists of words are written by the tests of the
# repository. \x7b and \x7d are the braces, which would have to be balanced here. The language server comes with
# kak-lsp, see the README.

declare-option -hidden str shaft_symbol '(?:hp_electric|short_ton|hp_boiler|long_ton|gal_imp|gal_us|mmH2O|inH2O|inch|thou|krpm|slug|barg|bara|psig|psia|mH2O|degC|degF|[%]|‰|ppm|deg|rev|nmi|mil|min|rpm|rps|mph|g_n|cfm|lbm|kgf|lbf|ozf|psi|atm|cSt|°C|°F|°|in|ft|yd|mi|ha|kn|lb|oz|kp|gf|tf|hp|PS|cP|cd|r|h|d|t|(?:T|G|M|k|h|da|d|c|m|μ|µ|u|n|p)?(?:Ohm|ohm|Hz|Wh|VA|Pa|Ω|Ah|Wb|m|l|L|g|N|J|W|A|V|H|F|C|T)|(?:m)?(?:bar|K)|(?:m|k)?(?:mol)|(?:m|μ|µ|u)?(?:rad|S)|(?:m|μ|µ|u|n|p)?(?:s))'

hook global BufCreate .*[.]shaft %{
    set-option buffer filetype shaft
}

hook global WinSetOption filetype=shaft %{
    require-module shaft
    add-highlighter window/shaft ref shaft
    set-option buffer comment_line '#'
    set-option window indentwidth 4
    hook window InsertChar \n -group shaft-indent shaft-indent-on-new-line
    hook window InsertChar \x7d -group shaft-indent shaft-indent-on-closing-brace
    hook -once -always window WinSetOption filetype=.* %{
        remove-highlighter window/shaft
        remove-hooks window shaft-indent
    }
}

provide-module shaft %@

add-highlighter shared/shaft regions
add-highlighter shared/shaft/code default-region group
add-highlighter shared/shaft/string region '"' (?<!\\)(\\\\)*("|\n) fill string
add-highlighter shared/shaft/documentation region -match-capture '^\h*##' '$' fill documentation
add-highlighter shared/shaft/comment region '#' '$' fill comment

# Fields before their =
add-highlighter shared/shaft/code/ regex '(?:^|[{;])\h*(?:\w+\.)*(\w+)\h*=(?!=)' 1:variable
add-highlighter shared/shaft/code/ regex '(?:^|[{;])\h*(gear)\h+(\w+)\h*=(?!=)' 1:keyword 2:variable
# Declarations
add-highlighter shared/shaft/code/ regex '^\h*(supply|source|transmission|load|let)\h+(\w+)' 1:keyword 2:variable
add-highlighter shared/shaft/code/ regex '^\h*(drive|case)\h+(\w+)' 1:keyword 2:module
add-highlighter shared/shaft/code/ regex '(?:^|[{;])\h*(allow)\h+([a-z][a-z0-9-]*)' 1:keyword 2:attribute
add-highlighter shared/shaft/code/ regex '^\h*(show)\h*["\w(-]' 1:keyword
# Title, use and the like
add-highlighter shared/shaft/code/ regex '^\h*(language|title|revision|use|require)\h+["\w]' 1:keyword
# Kinds of parts
add-highlighter shared/shaft/code/ regex '^\h*(?:supply|source|transmission|load)\h+\w+\h*:\h*(mains|battery|dc_bus|hydraulic_unit|compressed_air|straight_line|straight_line_force|dc_motor|series_motor|induction_motor|induction_circuit|servo|engine|wind_turbine|water_turbine|hydraulic_motor|pneumatic_motor|person|measured_curve|polynomial|constant_speed|gear|gearbox|reversing_gear|variable|planetary|worm|belt|chain|friction_pulley|drum|reeving|wheel|screw|rack|crank|shaft|universal_joint|brake|freewheel|coupling|clutch|fluid_coupling|constant|viscous|quadratic|power_law|constant_power|fan|pump|propeller|conveyor|cutting|work_stroke|generator|winder|hoist|off_axis_mass|incline|vehicle|flywheel)\b' 1:type
# Kinds of quantities
add-highlighter shared/shaft/code/ regex '^\h*let\h+\w+\h*:\h*(number|percentage|count|grade|angle|slope|length|area|volume|lead|displacement|time|frequency|rate|rotational_speed|angular_acceleration|speed|acceleration|mass|mass_per_length|mass_per_area|density|force|torque|energy|power|mechanical_power|electrical_power|heat|moment_of_inertia|flywheel_effect|torsional_stiffness|angular_momentum|viscous_torque_coefficient|quadratic_torque_coefficient|cubic_power_coefficient|stiffness|viscous_force_coefficient|quadratic_force_coefficient|cubic_force_coefficient|momentum|voltage|current|resistance|inductance|capacitance|charge|torque_constant|series_constant|voltage_constant|speed_constant|force_constant|speed_regulation|pressure|gauge_pressure|absolute_pressure|flow|mass_flow|dynamic_viscosity|kinematic_viscosity|temperature|temperature_difference|temperature_coefficient|thermal_resistance|thermal_conductance|heat_transfer_coefficient|heat_capacity|specific_heat_capacity|specific_energy|specific_consumption|specific_power|power_per_area)\b' 1:type
# Conditions
add-highlighter shared/shaft/code/ regex '(?<![\w.])(?:and|or|not|if|then|else)\b' 0:operator
# Clauses
add-highlighter shared/shaft/code/ regex '(?<![\w.])(?:as|at|with|within|only|because|from|measured|assumed|confidence|probability|points|csv|each|drives)\b' 0:keyword
add-highlighter shared/shaft/code/ regex '\b(?:only\h+(in|where)|not\h+(in)|(of\h+value))\b' 1:keyword 2:keyword 3:keyword
add-highlighter shared/shaft/code/ regex '\b(reduction|increase|teeth)\h+\w' 1:keyword
# Values
add-highlighter shared/shaft/code/ regex '(?<![\w.])(?:true|false|yes|no|absent|rated)\b' 0:value
add-highlighter shared/shaft/code/ regex '=\h*(S(?:10|[1-9]))\b' 1:value
# Known values
add-highlighter shared/shaft/code/ regex '(?<![\w.])(?:pi|standard_gravity)\b' 0:value
# Functions
add-highlighter shared/shaft/code/ regex '(?<![\w.])(?:sin|cos|tan|asin|acos|atan|atan2|sqrt|cbrt|exp|ln|log10|abs|min|max|floor|ceil|round)(?=\()' 0:function
add-highlighter shared/shaft/code/ regex '->|→|±|\.\.|[-+*/^=<>×·÷≤≥≠]' 0:operator

# Numbers, and the unit directly behind.
evaluate-commands %sh{
    factor="$kak_opt_shaft_symbol(?:\\^-?\\d+|[⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+)?"
    unit="(?:1/)?$factor(?:[·*/]\\(?$factor\\)?)*(?!\\w)"
    number='(?<![\w.])(\d+(?:\.\d+)?(?:[eE][+-]?\d+)?)'
    printf "add-highlighter shared/shaft/code/ regex '%s' 1:value 2:meta\n" "$number\\h*($unit)?"
    printf "add-highlighter shared/shaft/code/ regex '%s' 1:meta\n" "\\[\\h*($unit)\\h*\\]"
    printf "add-highlighter shared/shaft/code/ regex '%s' 1:meta\n" "\\bas\\h+($unit)\\h*(?:\$|#|only|not|at)"
}

define-command -hidden shaft-indent-on-new-line %{
    evaluate-commands -draft -itersel %{
        # Stand as the line before, one step further in behind a bracket that is left open.
        try %{ execute-keys -draft <semicolon> K <a-&> }
        try %{ execute-keys -draft k <a-x> s '[\x7b(\[]\h*(#[^\n]*)?$' <ret> j <a-gt> }
        # Go on with a comment.
        try %{ execute-keys -draft k <a-x> s '^\h*\K##?\h+' <ret> y j <a-h> P }
    }
}

define-command -hidden shaft-indent-on-closing-brace %{
    try %{ execute-keys -itersel -draft <a-h> <a-k> '^\h+\x7d$' <ret> h m s '\A|.\z' <ret> 1<a-&> }
}

@
