;;; colours.el --- checks joule-mode's colours  -*- lexical-binding: t; -*-
;; emacs -Q --batch -L .. -l colours.el: prints a line per check.
(require 'joule-mode)

(defconst cases
  '(("    U, peak voltage = 12.0(1) kV   per \"a # b\""
     ("U" . font-lock-variable-name-face) ("peak voltage" . font-lock-type-face) ("kV" . font-lock-builtin-face)
     ("per" . font-lock-keyword-face) ("\"a # b\"" . font-lock-string-face))
    ("    τ = R*C   # remark" ("τ" . font-lock-variable-name-face) ("remark" . font-lock-comment-face))
    ("    Q = 2 nC*V1" ("nC" . font-lock-builtin-face) ("V1"))
    ("    k = 5 W/(m^2·K) for f from 50 Hz to 1 MHz"
     ("W/(m^2·K)" . font-lock-builtin-face) ("for" . font-lock-keyword-face) ("to" . font-lock-keyword-face) ("MHz" . font-lock-builtin-face))
    ("    W = integral(w over disc) = __ mJ"
     ("integral" . font-lock-function-name-face) ("over" . font-lock-keyword-face) ("__" . font-lock-warning-face) ("mJ" . font-lock-builtin-face))
    ("    F = Q^2/(4*pi*eps_0*r^2)" ("pi" . font-lock-constant-face) ("eps_0" . font-lock-constant-face))
    ("    E = (0, 0, 4) kV/mm" ("kV/mm" . font-lock-builtin-face))
    ("    medium mica: linear, lossy" ("medium" . font-lock-keyword-face) ("linear, lossy" . font-lock-type-face))
    ("    waive scalar-permittivity for w: \"plane\"" ("waive" . font-lock-keyword-face) ("scalar-permittivity" . font-lock-constant-face))
    ("    check_1 = 3" ("check_1" . font-lock-variable-name-face))
    ("A flush line, 3 kV, for \"x # y" ("kV") ("for") ("y"))
    ("Prose\n    indented: W = 3 J for x" ("W") ("J") ("for"))
    ("    - a list, 3 J for x" ("J") ("for"))
    ("```\n    W = 3 J\n\n    U = 3 V\n```" ("J") ("V"))
    ("Prose with \"one quote\n\n    U = 3 V" ("U" . font-lock-variable-name-face) ("V" . font-lock-builtin-face))))

(defvar failed 0)

(defun look (text part face)
  "Print whether PART of TEXT has FACE throughout."
  (goto-char (point-max))
  (search-backward part)
  (let* ((wrong (seq-find (lambda (at) (not (eq (get-text-property at 'face) face)))
                          (number-sequence (point) (+ (point) (length part) -1)))))
    (when wrong (setq failed (1+ failed)))
    (princ (format "%s  Emacs colours: %s in \"%s\" is %s%s\n" (if wrong "FAIL" "ok  ")
                   part (string-replace "\n" "⏎" text) (or face "plain")
                   (if wrong (format ", not %s" (get-text-property wrong 'face)) "")))))

(dolist (c cases)
  (with-temp-buffer
    (insert (car c))
    (joule-mode)
    (font-lock-ensure)
    (dolist (wanted (cdr c)) (look (car c) (car wanted) (cdr wanted)))))

(dolist (name '("a.joule" "a.joule.md"))
  (let ((good (eq (assoc-default name auto-mode-alist #'string-match) 'joule-mode)))
    (unless good (setq failed (1+ failed)))
    (princ (format "%s  Emacs opens %s in joule-mode\n" (if good "ok  " "FAIL") name))))

(kill-emacs (if (= failed 0) 0 1))
