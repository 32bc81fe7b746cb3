;;; joule-mode.el --- Electromagnetic calculation notes  -*- lexical-binding: t; -*-

;; Version: 0.1.0
;; Package-Requires: ((emacs "28.1"))
;; Keywords: languages, tools

;;; Commentary:

;; Colours for Joule notes (NAME.joule, NAME.joule.md) and their checking by
;; `inkjoule serve' through Eglot.  Emacs 28 needs the package eglot; from
;; Emacs 29 on it is there.  README.md beside this file tells the two lines
;; for your init file.

;;; Code:

(require 'seq)
(require 'subr-x)

(defgroup joule nil
  "Calculation notes in electromagnetics."
  :group 'text)

(defcustom joule-program "inkjoule"
  "The program that checks notes: a full path, or a name on the PATH."
  :type 'string)

(defcustom joule-show-values t
  "Non-nil shows computed values at the end of formulas that do not state them."
  :type 'boolean)

;;;; What is calculation, what is prose

;; Each line carries the text property `joule-line': `blank', `prose',
;; `calculation', or a string, the mark of the fenced block that it stands in.

(defconst joule--name "[[:alpha:]][[:alnum:]_′₀-₉]*")

(defun joule--line-after (state)
  "The state of the line at point, where STATE is that of the line before."
  (cond
   ((stringp state)
    (if (looking-at (concat "[ \t]*" (regexp-quote state) "[`~]*[ \t]*$")) 'prose state))
   ((looking-at "[ \t]*\\(```+\\|~~~+\\)") (match-string-no-properties 1))
   ((looking-at "[ \t]*$") 'blank)
   ((and (memq state '(blank calculation))
         (save-excursion (skip-chars-forward " \t") (>= (current-column) 4))
         (not (looking-at "[ \t]*\\(?:[-*>+][ \t]\\||\\)")))
    'calculation)
   (t 'prose)))

(defun joule--propertize (start end)
  "Mark the lines between START and END; `#' and quotes mean nothing in prose."
  (goto-char start)
  (beginning-of-line)
  (let ((state (if (bobp) 'blank (or (get-text-property (1- (point)) 'joule-line) 'blank))))
    (while (< (point) end)
      (setq state (joule--line-after state))
      (let ((next (min (point-max) (1+ (line-end-position)))))
        (put-text-property (point) next 'joule-line state)
        (unless (eq state 'calculation)
          (while (re-search-forward "[#\"]" (line-end-position) t)
            (put-text-property (1- (point)) (point) 'syntax-table (string-to-syntax "."))))
        (goto-char next)))))

(defun joule--extend-region (start end)
  "Whole lines around START and END, for `joule--propertize'."
  (let ((from (save-excursion (goto-char start) (line-beginning-position)))
        (to (save-excursion (goto-char end) (line-beginning-position 2))))
    (unless (and (= from start) (= to end)) (cons from to))))

;;;; Colours

(defun joule--find (regexp)
  "A matcher for font-lock: REGEXP in calculation."
  (lambda (limit)
    (let (found)
      (while (and (not found) (re-search-forward regexp limit t))
        (save-match-data (syntax-propertize (point)))
        (setq found (eq (get-text-property (match-beginning 0) 'joule-line) 'calculation)))
      found)))

(defconst joule--statements
  '("medium" "region" "table" "uses" "regime" "plot" "assume" "criterion" "check" "safety" "waive"))

(defconst joule--clauses '("for" "from" "to" "in" "over" "at" "per" "as"))

(defconst joule--functions
  '("sqrt" "cbrt" "exp" "ln" "log10" "sin" "cos" "tan" "asin" "acos" "atan" "atan2" "sinh" "cosh" "tanh"
    "abs" "min" "max" "sum" "mean" "dot" "cross" "Re" "Im" "conj" "arg" "diag" "tensor" "uniaxial" "rotate"
    "inv" "trace" "det" "ellipK" "ellipE" "besselJ" "besselY" "erf" "awg" "lower" "upper" "integral" "loop"
    "derivative" "solve" "assembly_energy" "potential" "box" "ball" "shell" "cylinder" "tube" "rectangle"
    "disc" "sphere" "wall" "segment" "ring"))

(defconst joule--constants
  '("eps_0" "epsilon_0" "ε_0" "ε₀" "mu_0" "μ_0" "µ_0" "μ₀" "µ₀" "c_0" "c₀" "Z_0" "Z₀" "q_e" "m_e" "m_p" "k_B"
    "N_A" "h_planck" "hbar" "sigma_SB" "σ_SB" "g_n" "pi" "π" "j" "inf"))

;; A unit phrase has no blanks inside; a reserved word opens none.
(defconst joule--unit
  (let* ((symbol "\\(?:dB([^) \t\n]+)\\|[[:alpha:]%°]+\\)\\(?:\\^-?[0-9]+\\|\\^([^) \t\n]*)\\|[⁻²³¹⁰⁴-⁹]+\\)?")
         (group (concat "([[:alpha:]%°][^() \t\n]*)")))
    (concat symbol "\\(?:[·⋅./]\\(?:" symbol "\\|" group "\\)\\)*")))

(defvar joule-font-lock-keywords
  `((,(joule--find (concat "^[ \t]*\\(" (regexp-opt joule--statements) "\\)\\_>\\(?:[ \t]*[=(,]\\)?"))
     (1 (unless (string-match-p "[=(,]\\'" (match-string 0)) font-lock-keyword-face)))
    (,(joule--find (concat "^[ \t]*medium[ \t]+" joule--name "[ \t]*:\\([^#\"\n]*\\)")) 1 font-lock-type-face)
    (,(joule--find "^[ \t]*waive[ \t]+\\([[:alpha:]-]+\\)") 1 font-lock-constant-face)
    (,(joule--find (concat "^[ \t]*\\(" joule--name "\\)\\(?:([^()=\n]*)\\)?\\(?:[ \t]+in[ \t]+[[:alnum:]_.]+\\)?[ \t]*"
                           "\\(?:,\\([^=<>#\"(),\n]*\\)\\)?="))
     (1 font-lock-variable-name-face) (2 font-lock-type-face nil t))
    (,(joule--find (concat "\\_<" (regexp-opt joule--functions t) "(")) 1 font-lock-function-name-face)
    (,(joule--find (concat "\\_<" (regexp-opt joule--constants t) "\\_>")) 1 font-lock-constant-face)
    (,(joule--find (concat "\\_<[0-9]+\\(?:\\.[0-9]+\\)?\\(?:[eE][-+−]?[0-9]+\\)?\\(?:([0-9.]+)\\)?\\(?:[eE][-+−]?[0-9]+\\)?"
                           "\\(?:[ \t]+\\(" joule--unit "\\)\\|\\(°\\)\\)"))
     (1 (joule--unit-face 1) keep t) (2 font-lock-builtin-face keep t))
    (,(joule--find (concat ")[ \t]+\\(" joule--unit "\\)")) 1 (unless (equal (match-string 1) "in") (joule--unit-face 1)) keep)
    (,(joule--find (concat "\\_<__\\_>\\(?:[ \t]+\\(" joule--unit "\\)\\)?")) (0 font-lock-warning-face) (1 (joule--unit-face 1) t t))
    (,(joule--find "\\(\\[[^] \t\n]*\\]\\)") 1 font-lock-builtin-face)
    (,(joule--find (concat "\\_<" (regexp-opt joule--clauses t) "\\_>")) 1 font-lock-keyword-face)
    ("^ \\{0,3\\}#\\{1,6\\}[ \t].*$" . 'bold)
    ("^ \\{0,3\\}\\(?:==+\\|--+\\)[ \t]*$" . 'shadow))
  "What stands out in a note.")

(defun joule--unit-face (group)
  "The face of the unit phrase in match GROUP; nil for a reserved word."
  (unless (member (match-string group) (append joule--statements (remove "in" joule--clauses) '("j" "pi")))
    'font-lock-builtin-face))

(defvar joule-mode-syntax-table
  (let ((table (make-syntax-table text-mode-syntax-table)))
    (modify-syntax-entry ?# "<" table)
    (modify-syntax-entry ?\n ">" table)
    (modify-syntax-entry ?\" "\"" table)
    (modify-syntax-entry ?' "." table)
    (modify-syntax-entry ?_ "_" table)
    (dolist (mark '(?* ?/ ?+ ?- ?^ ?= ?< ?> ?| ?. ?· ?× ?± ?−)) (modify-syntax-entry mark "." table))
    table))

;;;###autoload
(define-derived-mode joule-mode text-mode "Joule"
  "Major mode for electromagnetic calculation notes."
  (setq-local comment-start "# " comment-start-skip "#+[ \t]*"
              indent-tabs-mode nil tab-width 4
              ;; A note's calculation stands four columns in: Tab goes there.
              indent-line-function #'tab-to-tab-stop
              parse-sexp-lookup-properties t
              syntax-propertize-function #'joule--propertize
              font-lock-defaults '(joule-font-lock-keywords))
  (add-hook 'syntax-propertize-extend-region-functions #'joule--extend-region nil t))

;;;###autoload
(add-to-list 'auto-mode-alist '("\\.joule\\(?:\\.md\\)?\\'" . joule-mode))

;;;; Checking, by Eglot

(defvar eglot-server-programs)
(declare-function eglot-ensure "eglot")
(declare-function eglot-current-server "eglot")
(declare-function eglot--TextDocumentIdentifier "eglot")
(declare-function eglot--lsp-position-to-point "eglot")
(declare-function jsonrpc-async-request "jsonrpc")

(defun joule--contact (&rest _)
  "The command that Eglot runs."
  (list joule-program "serve"))

(with-eval-after-load 'eglot
  (add-to-list 'eglot-server-programs '(joule-mode . joule--contact))
  (add-hook 'eglot-managed-mode-hook #'joule--eglot-managed))

;; Eglot shows inlay hints from Emacs 30 on.  Until then this does it.

(defvar-local joule--timer nil)

(defun joule--eglot-managed ()
  "Show values in a note that Eglot begins to manage, and none when it ends."
  (when (and (derived-mode-p 'joule-mode) (not (fboundp 'eglot-inlay-hints-mode)))
    (if (and joule-show-values (bound-and-true-p eglot--managed-mode))
        (progn
          (add-hook 'after-change-functions #'joule--values-soon nil t)
          (joule--values-soon))
      (remove-hook 'after-change-functions #'joule--values-soon t)
      (remove-overlays (point-min) (point-max) 'joule-value t))))

(defun joule--values-soon (&rest _)
  "Ask for the values once the text has been still for a moment."
  (when (timerp joule--timer) (cancel-timer joule--timer))
  (setq joule--timer (run-with-timer 0.6 nil #'joule--ask-for-values (current-buffer))))

(defun joule--ask-for-values (buffer)
  "Ask the server for the values of the note in BUFFER."
  (when (buffer-live-p buffer)
    (with-current-buffer buffer
      (when-let* ((server (eglot-current-server))
                  (tick (buffer-chars-modified-tick)))
        (jsonrpc-async-request
         server :textDocument/inlayHint
         (list :textDocument (eglot--TextDocumentIdentifier)
               :range (list :start '(:line 0 :character 0)
                            :end (list :line (line-number-at-pos (point-max)) :character 0)))
         :success-fn (lambda (hints) (joule--draw-values buffer tick hints))
         :error-fn #'ignore :timeout-fn #'ignore :deferred :joule-values)))))

(defun joule--draw-values (buffer tick hints)
  "Write HINTS at the line ends of BUFFER, unless its text is newer than TICK."
  (when (buffer-live-p buffer)
    (with-current-buffer buffer
      (when (= tick (buffer-chars-modified-tick))
        (save-restriction
          (widen)
          (remove-overlays (point-min) (point-max) 'joule-value t)
          (seq-do #'joule--draw-value hints))))))

(defun joule--draw-value (hint)
  "Write one HINT."
  (let* ((label (plist-get hint :label))
         (text (if (stringp label) label (mapconcat (lambda (part) (plist-get part :value)) label "")))
         (at (eglot--lsp-position-to-point (plist-get hint :position)))
         (overlay (make-overlay at at nil nil t)))
    (overlay-put overlay 'joule-value t)
    (overlay-put overlay 'after-string
                 (propertize (concat " " (string-trim text)) 'face 'shadow 'cursor t))))

(provide 'joule-mode)
;;; joule-mode.el ends here
