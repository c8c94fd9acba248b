;;; layshaft-mode.el --- Unit-checked powertrain specs -*- lexical-binding: t; coding: utf-8 -*-

;; Version: 0.1.0
;; Package-Requires: ((emacs "28.1"))
;; Keywords: languages

;;; Commentary:

;; A major mode for Layshaft specs, files that end in .shaft: colours, indentation, an index of what is declared, and
;; the language server through Eglot, which is built into Emacs since 29 and a package for 28.
;;
;;   (require 'layshaft-mode)
;;   (add-hook 'layshaft-mode-hook #'eglot-ensure)

;;; Code:

(require 'cl-lib)
(require 'project)

(defgroup layshaft nil
  "Unit-checked powertrain specs."
  :group 'languages)

(defcustom layshaft-command '("layshaft" "lsp")
  "The command that starts the language server, a list of strings."
  :type '(repeat string))

(defcustom layshaft-indent-offset 4
  "Columns by which the lines inside of brackets are indented."
  :type 'natnum
  :safe #'natnump)

;; The lists of words are written by the tests of the repository.

(defconst layshaft-declarations
  '(
    "language" "title" "revision" "use" "let" "supply" "source" "transmission" "load" "drive" "case"
    "require" "show" "allow")
  "Words that declare.")

(defconst layshaft-logic
  '(
    "and" "or" "not" "if" "then" "else")
  "Words that join conditions.")

(defconst layshaft-constants
  '(
    "true" "false" "yes" "no" "absent" "rated")
  "Words that stand for a value.")

(defconst layshaft-clauses
  '(
    "as" "at" "with" "within" "only" "because" "from" "measured" "assumed" "confidence" "probability"
    "points" "csv" "each" "drives")
  "Reserved words besides those.")

(defconst layshaft-functions
  '(
    "sin" "cos" "tan" "asin" "acos" "atan" "atan2" "sqrt" "cbrt" "exp" "ln" "log10" "abs" "min" "max" "floor"
    "ceil" "round")
  "Functions of expressions.")

(defconst layshaft-known-values
  '(
    "pi" "standard_gravity")
  "Values every spec knows.")

(defconst layshaft-kinds
  '(
    "mains" "battery" "dc_bus" "hydraulic_unit" "compressed_air" "straight_line" "straight_line_force"
    "dc_motor" "series_motor" "induction_motor" "induction_circuit" "servo" "engine" "wind_turbine"
    "water_turbine" "hydraulic_motor" "pneumatic_motor" "person" "measured_curve" "polynomial"
    "constant_speed" "gear" "gearbox" "reversing_gear" "variable" "planetary" "worm" "belt" "chain"
    "friction_pulley" "drum" "reeving" "wheel" "screw" "rack" "crank" "shaft" "universal_joint" "brake"
    "freewheel" "coupling" "clutch" "fluid_coupling" "constant" "viscous" "quadratic" "power_law"
    "constant_power" "fan" "pump" "propeller" "conveyor" "cutting" "work_stroke" "generator" "winder" "hoist"
    "off_axis_mass" "incline" "vehicle" "flywheel")
  "Kinds of parts.")

(defconst layshaft-quantities
  '(
    "number" "percentage" "count" "grade" "angle" "slope" "length" "area" "volume" "lead" "displacement"
    "time" "frequency" "rate" "rotational_speed" "angular_acceleration" "speed" "acceleration" "mass"
    "mass_per_length" "mass_per_area" "density" "force" "torque" "energy" "power" "mechanical_power"
    "electrical_power" "heat" "moment_of_inertia" "flywheel_effect" "torsional_stiffness" "angular_momentum"
    "viscous_torque_coefficient" "quadratic_torque_coefficient" "cubic_power_coefficient" "stiffness"
    "viscous_force_coefficient" "quadratic_force_coefficient" "cubic_force_coefficient" "momentum" "voltage"
    "current" "resistance" "inductance" "capacitance" "charge" "torque_constant" "series_constant"
    "voltage_constant" "speed_constant" "force_constant" "speed_regulation" "pressure" "gauge_pressure"
    "absolute_pressure" "flow" "mass_flow" "dynamic_viscosity" "kinematic_viscosity" "temperature"
    "temperature_difference" "temperature_coefficient" "thermal_resistance" "thermal_conductance"
    "heat_transfer_coefficient" "heat_capacity" "specific_heat_capacity" "specific_energy"
    "specific_consumption" "specific_power" "power_per_area")
  "Kinds of quantities.")

(defconst layshaft--symbol
  "\\(?:hp_electric\\|short_ton\\|hp_boiler\\|long_ton\\|gal_imp\\|gal_us\\|mmH2O\\|inH2O\\|inch\\|thou\\|krpm\\|slug\\|barg\\|bara\\|psig\\|psia\\|mH2O\\|degC\\|degF\\|[%]\\|‰\\|ppm\\|deg\\|rev\\|nmi\\|mil\\|min\\|rpm\\|rps\\|mph\\|g_n\\|cfm\\|lbm\\|kgf\\|lbf\\|ozf\\|psi\\|atm\\|cSt\\|°C\\|°F\\|°\\|in\\|ft\\|yd\\|mi\\|ha\\|kn\\|lb\\|oz\\|kp\\|gf\\|tf\\|hp\\|PS\\|cP\\|cd\\|r\\|h\\|d\\|t\\|\\(?:T\\|G\\|M\\|k\\|h\\|da\\|d\\|c\\|m\\|μ\\|µ\\|u\\|n\\|p\\)?\\(?:Ohm\\|ohm\\|Hz\\|Wh\\|VA\\|Pa\\|Ω\\|Ah\\|Wb\\|m\\|l\\|L\\|g\\|N\\|J\\|W\\|A\\|V\\|H\\|F\\|C\\|T\\)\\|\\(?:m\\)?\\(?:bar\\|K\\)\\|\\(?:m\\|k\\)?\\(?:mol\\)\\|\\(?:m\\|μ\\|µ\\|u\\)?\\(?:rad\\|S\\)\\|\\(?:m\\|μ\\|µ\\|u\\|n\\|p\\)?\\(?:s\\)\\)"
  "A symbol of a unit with its prefix.")

(defconst layshaft--name "[[:alpha:]_][[:alnum:]_]*")

(defconst layshaft--number "[0-9]+\\(?:\\.[0-9]+\\)?\\(?:[eE][+-]?[0-9]+\\)?")

(defconst layshaft--unit
  (let ((factor (concat layshaft--symbol "\\(?:\\^-?[0-9]+\\|[⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+\\)?")))
    (concat "\\(?:1/\\)?" factor "\\(?:[·*/](?" factor ")?\\)*"))
  "A whole unit: symbols with their operators tight.")

(defconst layshaft--roles '("supply" "source" "transmission" "load"))

(defvar layshaft-mode-syntax-table
  (let ((table (make-syntax-table)))
    (modify-syntax-entry ?# "<" table)
    (modify-syntax-entry ?\n ">" table)
    (modify-syntax-entry ?\" "\"" table)
    (modify-syntax-entry ?\\ "\\" table)
    (modify-syntax-entry ?_ "_" table)
    (modify-syntax-entry ?\( "()" table)
    (modify-syntax-entry ?\) ")(" table)
    (modify-syntax-entry ?\[ "(]" table)
    (modify-syntax-entry ?\] ")[" table)
    (modify-syntax-entry ?{ "(}" table)
    (modify-syntax-entry ?} "){" table)
    (dolist (sign '(?+ ?- ?* ?/ ?= ?< ?> ?^ ?% ?± ?× ?· ?÷ ?→ ?≤ ?≥ ?≠ ?° ?. ?, ?\; ?:))
      (modify-syntax-entry sign "." table))
    table)
  "Syntax table of `layshaft-mode'.")

(defun layshaft--words (words)
  "A regular expression for WORDS that do not stand behind a point."
  (concat "\\(?:^\\|[^.[:alnum:]_]\\)\\(" (regexp-opt words) "\\)\\_>"))

(defvar layshaft-font-lock-keywords
  (let ((name layshaft--name)
        (quantity (concat "\\_<" layshaft--number "[ \t]*\\(" layshaft--unit "\\)\\(?:[^[:alnum:]_(]\\|$\\)")))
    `(;; source motor: dc_motor
      (,(concat "^[ \t]*" (regexp-opt layshaft--roles t) "[ \t]+\\(" name "\\)\\(?:[ \t]*:[ \t]*\\("
                (regexp-opt layshaft-kinds) "\\)\\_>\\)?")
       (1 font-lock-keyword-face) (2 font-lock-variable-name-face) (3 font-lock-type-face nil t))
      ;; let pull: force = …
      (,(concat "^[ \t]*\\(let\\)[ \t]+\\(" name "\\)\\(?:[ \t]*:[ \t]*\\(" (regexp-opt layshaft-quantities)
                "\\)\\_>\\)?")
       (1 font-lock-keyword-face) (2 font-lock-variable-name-face) (3 font-lock-type-face nil t))
      ;; drive lift = …, case corner { … }
      (,(concat "^[ \t]*\\(drive\\|case\\)[ \t]+\\(" name "\\)")
       (1 font-lock-keyword-face) (2 font-lock-function-name-face))
      ;; allow load-share because "…"
      ("\\(?:^\\|[{;]\\)[ \t]*\\(allow\\)[ \t]+\\([a-z][a-z0-9-]*\\)"
       (1 font-lock-keyword-face) (2 font-lock-constant-face))
      (,(concat "^[ \t]*" (regexp-opt layshaft-declarations t) "[ \t]+[\"[:alnum:]_(-]")
       (1 font-lock-keyword-face))
      ;; gear low = …, rated_torque = …, mains.voltage = …
      (,(concat "\\(?:^\\|[{;]\\)[ \t]*\\(gear\\)[ \t]+\\([[:alnum:]_]+\\)[ \t]*=")
       (1 font-lock-keyword-face) (2 font-lock-variable-name-face))
      (,(concat "\\(?:^\\|[{;]\\)[ \t]*\\(?:" name "\\.\\)*\\(" name "\\)[ \t]*=\\(?:[^=]\\|$\\)")
       (1 font-lock-variable-name-face))
      (,(layshaft--words layshaft-logic) (1 font-lock-keyword-face))
      (,(layshaft--words layshaft-clauses) (1 font-lock-keyword-face))
      (,(layshaft--words layshaft-constants) (1 font-lock-constant-face))
      (,(layshaft--words layshaft-known-values) (1 font-lock-constant-face))
      ("\\_<only[ \t]+\\(in\\|where\\)\\_>" (1 font-lock-keyword-face))
      ("\\_<not[ \t]+\\(in\\)\\_>" (1 font-lock-keyword-face))
      ("\\_<\\(of\\)[ \t]+\\(value\\)\\_>" (1 font-lock-keyword-face) (2 font-lock-keyword-face))
      ("\\_<\\(reduction\\|increase\\|teeth\\)[ \t]+[[:alnum:]_]" (1 font-lock-keyword-face))
      ("=[ \t]*\\(S\\(?:10\\|[1-9]\\)\\)\\_>" (1 font-lock-constant-face))
      (,(concat "\\_<\\(" (regexp-opt layshaft-functions) "\\)(") (1 font-lock-builtin-face))
      ;; The unit behind a number, in a table's head, behind the `as' of a show.
      (,quantity (1 font-lock-type-face))
      (,(concat "\\[[ \t]*\\(" layshaft--unit "\\)[ \t]*\\]") (1 font-lock-type-face))
      (,(concat "\\_<as[ \t]+\\(" layshaft--unit "\\)[ \t]*\\(?:$\\|#\\|\\_<\\(?:only\\|not\\|at\\)\\_>\\)")
       (1 font-lock-type-face))))
  "Font-lock keywords of `layshaft-mode'.")

(defun layshaft--syntactic-face (state)
  "The face of a comment or text by its STATE; ## is documentation."
  (cond ((nth 3 state) font-lock-string-face)
        ((eq (char-after (1+ (nth 8 state))) ?#) font-lock-doc-face)
        (t font-lock-comment-face)))

;;; Indentation

(defun layshaft--goes-on-p ()
  "Whether the line at point goes on with the one before."
  (save-excursion
    (back-to-indentation)
    (or (looking-at "->\\|→")
        (and (looking-at (concat (regexp-opt (append layshaft-clauses layshaft-logic)) "\\_>"))
             (not (looking-at "\\(?:\\sw\\|\\s_\\)+[ \t]*=")))
        (progn
          (forward-comment (- (point)))
          (and (> (point) (point-min))
               (looking-back (concat "\\(?:[-+*/^=,×÷·±<>≤≥≠→]\\|\\.\\.\\|\\_<" (regexp-opt layshaft-logic) "\\)")
                             (line-beginning-position)))))))

(defun layshaft--column ()
  "The column the line at point is to begin at."
  (save-excursion
    (back-to-indentation)
    (let* ((closing (looking-at "[])}]"))
           (open (nth 1 (syntax-ppss (line-beginning-position))))
           (goes-on (and (not closing) (layshaft--goes-on-p)))
           (base (if (not open)
                     0
                   (goto-char open)
                   (+ (current-indentation) (if closing 0 layshaft-indent-offset)))))
      ;; Inside of ( and [ a line goes on anyway.
      (if (and goes-on (or (not open) (eq (char-after open) ?{)))
          (+ base layshaft-indent-offset)
        base))))

(defun layshaft-indent-line ()
  "Indent the line at point."
  (interactive)
  (let ((column (layshaft--column))
        (inside (> (current-column) (current-indentation))))
    (if inside
        (save-excursion (indent-line-to column))
      (indent-line-to column))))

;;; What is declared

(defvar layshaft-imenu-generic-expression
  (let ((name layshaft--name))
    `(("Values" ,(concat "^[ \t]*let[ \t]+\\(" name "\\)") 1)
      ("Parts" ,(concat "^[ \t]*" (regexp-opt layshaft--roles) "[ \t]+\\(" name "\\)[ \t]*[:=]") 1)
      ("Drives" ,(concat "^[ \t]*drive[ \t]+\\(" name "\\)") 1)
      ("Cases" ,(concat "^[ \t]*case[ \t]+\\(" name "\\)") 1)
      ("Criteria" "^[ \t]*require[ \t]+\"\\([^\"\n]+\\)\"" 1)))
  "What `imenu' lists in `layshaft-mode'.")

;;; The mode

;;;###autoload
(define-derived-mode layshaft-mode prog-mode "Layshaft"
  "Major mode for Layshaft specs.

The language server adds values, findings, completion and
formatting: \\[eglot], or `eglot-ensure' in `layshaft-mode-hook'."
  (setq-local comment-start "# ")
  (setq-local comment-start-skip "#+[ \t]*")
  (setq-local comment-end "")
  (setq-local indent-line-function #'layshaft-indent-line)
  (setq-local electric-indent-chars (append "}])" electric-indent-chars))
  (setq-local indent-tabs-mode nil)
  (setq-local imenu-generic-expression layshaft-imenu-generic-expression)
  (setq-local font-lock-defaults
              '(layshaft-font-lock-keywords nil nil nil
                (font-lock-syntactic-face-function . layshaft--syntactic-face))))

;;;###autoload
(add-to-list 'auto-mode-alist '("\\.shaft\\'" . layshaft-mode))

;;; The project and the server

(defun layshaft--project (folder)
  "The nearest folder above FOLDER that holds a layshaft.toml, as a project.
A spec uses files below that folder only."
  (let ((root (locate-dominating-file folder "layshaft.toml")))
    (and root (derived-mode-p 'layshaft-mode) (cons 'layshaft root))))

(cl-defmethod project-root ((project (head layshaft)))
  "The folder of PROJECT."
  (cdr project))

(add-hook 'project-find-functions #'layshaft--project)

(put 'layshaft-mode 'eglot-language-id "shaft")

(defvar eglot-server-programs)
(with-eval-after-load 'eglot
  (add-to-list 'eglot-server-programs (cons 'layshaft-mode (lambda (&rest _) layshaft-command))))

(provide 'layshaft-mode)

;;; layshaft-mode.el ends here
