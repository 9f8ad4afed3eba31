(require 'eglot)
(add-to-list 'eglot-server-programs '(text-mode . ("foulcase" "editor")))
(add-hook 'text-mode-hook #'eglot-ensure)
